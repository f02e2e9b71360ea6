import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { outgrown, type Pace } from "../../functions/cloud/outgrown.ts";

const pace = fc.record({
  doneTables: fc.integer({ min: 0, max: 10_000 }),
  leftTables: fc.integer({ min: 0, max: 10_000 }),
  elapsedMilliseconds: fc.integer({ min: 0, max: 900_000 }),
  remainingMilliseconds: fc.integer({ min: 0, max: 900_000 }),
});

describe("a run is outgrown", () => {
  it("when the rest at the pace seen does not fit the time left less a minute for closing", () => {
    // 60 s for 25 tables: 975 more take 2,340 s of 840 s.
    const slow = {
      doneTables: 25,
      leftTables: 975,
      elapsedMilliseconds: 60_000,
      remainingMilliseconds: 840_000,
    };
    expect(outgrown(slow)).toBe(true);
    expect(outgrown({ ...slow, leftTables: 200 })).toBe(false); // 600 s
  });

  it("never before anything was done, nor after all was", () => {
    fc.assert(
      fc.property(pace, (one) => {
        expect(outgrown({ ...one, doneTables: 0 })).toBe(false);
        expect(outgrown({ ...one, leftTables: 0 })).toBe(false);
      }),
    );
  });

  it("all the more with more work, less time or a slower pace", () => {
    const worse = (one: Pace): Pace[] => [
      { ...one, leftTables: one.leftTables + 100 },
      { ...one, remainingMilliseconds: one.remainingMilliseconds / 2 },
      { ...one, elapsedMilliseconds: one.elapsedMilliseconds * 2 },
    ];
    fc.assert(
      fc.property(pace, (one) => {
        if (outgrown(one)) for (const other of worse(one)) expect(outgrown(other)).toBe(true);
      }),
    );
  });
});
