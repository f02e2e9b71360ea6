import { describe, expect, it } from "vitest";
import { forecastSeries } from "../../lib/forecast/forecastSeries.ts";
import { leadingZeros } from "../../lib/forecast/leadingZeros.ts";
import { normalDraws } from "../../lib/forecast/normalDraws.ts";
import { boundsOf } from "../../lib/forecast/valueKind.ts";

/** Whole numbers about `mean`, by rounding a normal law; never below zero. */
function counts(count: number, mean: number, deviation: number, seed: number): number[] {
  const draw = normalDraws(seed);
  return Array.from({ length: count }, () => Math.max(0, Math.round(mean + deviation * draw())));
}
const zeros = (count: number): number[] => Array(count).fill(0);

describe("zeros before a series began", () => {
  it("are told from others by the rule of succession", () => {
    // After m zeros of m the chance of K more is (m + 1)/(m + K + 1) (Laplace 1774): 11 of 1,012 is above one in a
    // hundred for K = 1,001, and not for 1,100.
    const slow = [5, ...zeros(10)];
    expect(leadingZeros(Float64Array.from([...zeros(1001), ...slow]), 8)).toBe(0);
    expect(leadingZeros(Float64Array.from([...zeros(1100), ...slow]), 8)).toBe(1100);
    // With none of nine zero after the first, 1/11 for one zero before it and 1·2·3/(11·12·13) for three.
    const busy = Array(10).fill(3);
    expect(leadingZeros(Float64Array.from([0, ...busy]), 8)).toBe(0);
    expect(leadingZeros(Float64Array.from([0, 0, 0, ...busy]), 8)).toBe(3);
  });

  it("are kept where little came since, and counted with the gaps among them", () => {
    expect(leadingZeros(Float64Array.from([...zeros(50), 4, 5, 4]), 8)).toBe(0);
    const gap = Number.NaN;
    expect(leadingZeros(Float64Array.from([0, gap, 0, 0, 0, ...Array(12).fill(2)]), 8)).toBe(5);
    expect(leadingZeros(Float64Array.from(zeros(30)), 8)).toBe(0);
  });

  it("do not make a new article intermittent, and are told", () => {
    const sold = counts(40, 30, 4, 3);
    const options = { horizon: 4, levels: [80], period: "week" } as const;
    const { median, notes } = forecastSeries([...zeros(100), ...sold], options);
    expect(notes[0]).toEqual({ code: "zeros-first", index: 100 });
    expect(notes.map(({ code }) => code)).not.toContain("intermittent");
    expect(median).toEqual(forecastSeries(sold, options).median);
  });

  it("leave a flag that was raised as it is", () => {
    const { point, notes } = forecastSeries([...zeros(90), ...Array(20).fill(1)], {
      horizon: 3,
      levels: [80],
    });
    expect([...point]).toEqual([1, 1, 1]);
    expect(notes.map(({ code }) => code)).toEqual(["zeros-first", "constant"]);
  });
});

describe("counts", () => {
  it("stay at zero or above where they were zero several times and never less", () => {
    const few = counts(120, 1.5, 1.2, 5);
    const { intervals, total } = forecastSeries(few, { horizon: 6, levels: [80, 95, 99.9] });
    for (const { low } of intervals) for (const bound of low) expect(bound).toBeGreaterThanOrEqual(0);
    for (const { low } of total.intervals) expect(low).toBeGreaterThanOrEqual(0);
  });

  it("have no floor that a value below zero, few zeros or a stated bound speaks against", () => {
    const floor = (values: readonly number[], stated?: { low?: number; high?: number }) =>
      boundsOf(Float64Array.from(values), stated)?.low;
    expect(floor([0, 0, 0, 0, 0, 3])).toBe(0);
    expect(floor([0, 0, 0, 0, 3])).toBeUndefined();
    expect(floor([0, 0, 0, 0, 0, -1])).toBeUndefined();
    expect(floor([0, 0, 0, 0, 0, 3], { low: -5 })).toBe(-5);
    expect(floor([0, 0, 0, 0, 0, 3], { high: -1 })).toBeUndefined();
  });

  it("have ranges of whole numbers, each around point and median, which hold what a count's range should", () => {
    let inside = 0;
    for (let seed = 1; seed <= 40; seed++) {
      const all = counts(104, 2, 1.4, seed);
      const { point, median, intervals, total } = forecastSeries(all.slice(0, 100), {
        horizon: 4,
        levels: [80, 95],
      });
      for (const { low, high } of intervals) {
        for (let h = 0; h < 4; h++) {
          expect([low[h], high[h]].every(Number.isInteger)).toBe(true);
          expect(low[h]).toBeLessThanOrEqual(Math.min(point[h], median[h]));
          expect(high[h]).toBeGreaterThanOrEqual(Math.max(point[h], median[h]));
        }
      }
      for (const { low, high } of total.intervals) {
        expect([low, high].every(Number.isInteger)).toBe(true);
        expect(low).toBeLessThanOrEqual(total.point);
        expect(high).toBeGreaterThanOrEqual(total.point);
      }
      const [{ low, high }] = intervals;
      inside += all.slice(100).filter((value, h) => value >= low[h] && value <= high[h]).length;
    }
    // 160 outcomes, at least 80 % meant: fewer than 112 would be three standard errors below.
    expect(inside).toBeGreaterThanOrEqual(112);
  });

  it("keep a bound that is no whole number", () => {
    const { intervals } = forecastSeries(counts(80, 9, 3, 8), {
      horizon: 3,
      levels: [95],
      bounds: { high: 10.6 },
    });
    for (const bound of intervals[0].high) expect(bound).toBe(10.6);
  });
});
