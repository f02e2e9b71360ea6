import { describe, expect, it } from "vitest";
import { dueRuns } from "../../lib/job/replay.ts";

describe("due runs of a replay", () => {
  it("step by weeks from the first instant to the last", () => {
    expect(dueRuns("2026-11-16T06:00:00Z", "2026-11-30T06:00:00Z", "week")).toEqual([
      "2026-11-16T06:00:00Z",
      "2026-11-23T06:00:00Z",
      "2026-11-30T06:00:00Z",
    ]);
  });

  it("return to the last day of the month after a shorter month", () => {
    expect(
      dueRuns("2026-01-31T12:00:00Z", "2026-03-31T12:00:00Z", "month").map((one) => one.slice(0, 10)),
    ).toEqual(["2026-01-31", "2026-02-28", "2026-03-31"]);
  });

  it("refuse an end before the start", () => {
    expect(() => dueRuns("2026-11-30T06:00:00Z", "2026-11-16T06:00:00Z", "week")).toThrow(RangeError);
  });
});
