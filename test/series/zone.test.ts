import { tzOffset } from "@date-fns/tz";
import * as fc from "fast-check";
import { afterEach, describe, expect, it } from "vitest";
import { currentPeriod } from "../../lib/series/currentPeriod.ts";
import { readTable } from "../../lib/series/readTable.ts";
import { instantsOf, zoneOffset } from "../../lib/series/zone.ts";

const hour = 3_600_000;
const at = (text: string) => Date.parse(text);

describe("zoneOffset", () => {
  // Transitions of the IANA time-zone database (files europe, northamerica, australasia, asia, africa), as zdump -v
  // prints them: the last second before, and the offset from the next on.
  it.each([
    ["Europe/Berlin", "2026-03-29T00:59:59Z", 1, 2],
    ["Europe/Berlin", "2026-10-25T00:59:59Z", 2, 1],
    ["Europe/Lisbon", "2026-03-29T00:59:59Z", 0, 1],
    ["America/New_York", "2026-03-08T06:59:59Z", -5, -4],
    ["America/New_York", "2026-11-01T05:59:59Z", -4, -5],
    ["America/New_York", "2006-04-02T06:59:59Z", -5, -4],
    ["Australia/Lord_Howe", "2026-04-04T14:59:59Z", 11, 10.5],
    ["Australia/Sydney", "2026-10-03T15:59:59Z", 10, 11],
    ["Asia/Kathmandu", "1985-12-31T18:29:59Z", 5.5, 5.75],
    ["Pacific/Apia", "2011-12-30T09:59:59Z", -10, 14],
    ["Europe/Dublin", "1972-10-29T01:59:59Z", 1, 0],
  ])("knows the change of %s after %s", (zone, before, offsetBefore, offsetAfter) => {
    expect(zoneOffset(at(before), zone) / hour).toBe(offsetBefore);
    expect(zoneOffset(at(before) + 1000, zone) / hour).toBe(offsetAfter);
  });

  const zones = fc.constantFrom(
    "UTC",
    "Europe/Lisbon",
    "Europe/Berlin",
    "America/New_York",
    "America/St_Johns",
    "America/Sao_Paulo",
    "Asia/Kolkata",
    "Asia/Tokyo",
    "Australia/Lord_Howe",
    "Pacific/Chatham",
    "Africa/Casablanca",
  );
  const instants = fc.integer({
    min: at("1975-01-01T00:00:00Z") / 1000,
    max: at("2037-01-01T00:00:00Z") / 1000,
  });

  it("agrees with @date-fns/tz at any instant", () => {
    fc.assert(
      fc.property(zones, instants, (zone, seconds) => {
        expect(zoneOffset(seconds * 1000, zone)).toBe(tzOffset(zone, new Date(seconds * 1000)) * 60_000);
      }),
      { numRuns: 500 },
    );
  });

  it("goes there and back: every instant is among those of its local reading", () => {
    fc.assert(
      fc.property(zones, instants, (zone, seconds) => {
        const instant = seconds * 1000;
        expect(instantsOf(instant + zoneOffset(instant, zone), zone)).toContain(instant);
      }),
      { numRuns: 500 },
    );
  });
});

describe("instantsOf", () => {
  it("gives two instants for the hour a clock repeats and none for the one it skips", () => {
    const read = (text: string, zone: string) =>
      instantsOf(at(`${text}Z`), zone).map((instant) => new Date(instant).toISOString().slice(0, 16));
    expect(read("2026-10-25T02:30", "Europe/Berlin")).toEqual(["2026-10-25T00:30", "2026-10-25T01:30"]);
    expect(read("2026-03-29T02:30", "Europe/Berlin")).toEqual([]);
    expect(read("2026-07-01T02:30", "Europe/Berlin")).toEqual(["2026-07-01T00:30"]);
    expect(read("2026-11-01T01:30", "America/New_York")).toEqual(["2026-11-01T05:30", "2026-11-01T06:30"]);
    expect(read("2026-04-05T01:45", "Australia/Lord_Howe")).toEqual(["2026-04-04T14:45", "2026-04-04T15:15"]);
  });
});

describe("the machine's own time zone", () => {
  const before = process.env.TZ;
  afterEach(() => {
    if (before === undefined) delete process.env.TZ;
    else process.env.TZ = before;
  });

  it.each(["UTC", "America/New_York", "Asia/Kolkata", "Pacific/Apia"])("changes nothing (%s)", (zone) => {
    process.env.TZ = zone;
    const read = (text: string) =>
      readTable(text, {}, { asOf: "2026-12-01T06:00:00Z", timeZone: "Europe/Lisbon" }).series[0];
    expect(read("date,v\n2026-03-28,1\n2026-03-29,2\n2026-03-30,3\n").start).toBe("2026-03-28");
    expect(read("date,v\nMar 28 2026,1\nMar 29 2026,2\n").start).toBe("2026-03-28");
    expect(read("time,v\n2026-07-01 00:00,1\n2026-07-01 01:00,2\n2026-07-01 02:00,3\n").start).toBe(
      "2026-06-30T23:00:00Z",
    );
    expect(currentPeriod("2026-12-01T00:30:00Z", "day", "Europe/Lisbon")).toBe("2026-12-01");
  });
});
