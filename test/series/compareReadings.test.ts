import { describe, expect, it } from "vitest";
import { compareReadings } from "../../lib/series/compareReadings.ts";
import type { Period, Series } from "../../lib/series/series.ts";

const series = (start: string, values: readonly number[], period: Period = "week"): Series => ({
  name: "v",
  period,
  start,
  values: Float64Array.from(values),
  observed: values.filter((value) => !Number.isNaN(value)).length,
  gaps: values.filter((value) => Number.isNaN(value)).length,
});
const earlier = { period: "week", start: "2026-03-02", values: [1, 2, null, 4] } as const;

describe("compareReadings", () => {
  it("finds nothing where only new periods came", () => {
    expect(compareReadings(earlier, series("2026-03-02", [1, 2, NaN, 4, 5]))).toBeNull();
    expect(compareReadings(earlier, series("2026-02-23", [9, 1, 2, NaN, 4]))).toBeNull();
  });

  it("counts changed values and names the first and the largest", () => {
    expect(compareReadings(earlier, series("2026-03-02", [1, 2.5, NaN, 9, 5]))).toEqual({
      count: 2,
      firstPeriod: "2026-03-09",
      largest: { period: "2026-03-23", before: 4, after: 9 },
    });
  });

  it("counts gaps that were filled and values that went, not rows that left the front of a rolling export", () => {
    expect(compareReadings(earlier, series("2026-03-09", [2, 3, 4]))).toEqual({
      count: 1,
      firstPeriod: "2026-03-16",
      largest: { period: "2026-03-16", before: null, after: 3 },
    });
    expect(compareReadings(earlier, series("2026-03-02", [1, 2]))).toEqual({
      count: 1,
      firstPeriod: "2026-03-23",
      largest: { period: "2026-03-23", before: 4, after: null },
    });
  });

  it("compares nothing when the step or the start of weeks is another", () => {
    expect(compareReadings(earlier, series("2026-03-01", [7, 7, 7, 7]))).toBeNull();
    expect(compareReadings(earlier, series("2026-03-02", [7, 7, 7, 7], "day"))).toBeNull();
  });
});
