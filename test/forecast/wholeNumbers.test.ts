import { describe, expect, it } from "vitest";
import { boundsOf } from "../../lib/forecast/bounds.ts";
import { forecastSeries } from "../../lib/forecast/forecastSeries.ts";
import { leadingZeros } from "../../lib/forecast/leadingZeros.ts";
import { normalDraws } from "../../lib/forecast/normalDraws.ts";

/** Whole numbers about `mean`, by rounding a normal law; never below zero. */
function counts(count: number, mean: number, deviation: number, seed: number): number[] {
  const draw = normalDraws(seed);
  return Array.from({ length: count }, () => Math.max(0, Math.round(mean + deviation * draw())));
}
const zeros = (count: number): number[] => Array(count).fill(0);

describe("zeros before a series began", () => {
  const leftOut = (...values: readonly number[]): number => leadingZeros(Float64Array.from(values));

  it("are told from others by the rule of succession", () => {
    // After m zeros of m the chance of K more is (m + 1)/(m + K + 1) (Laplace 1774): 11 of 1,012 is above one in a
    // hundred for K = 1,001, and 11 of 1,111 below it for K = 1,100.
    const slow = [5, ...zeros(10)];
    expect(leftOut(...zeros(1001), ...slow)).toBe(0);
    expect(leftOut(...zeros(1100), ...slow)).toBe(1100);
    // With none of nine zero after the first: 1·2/(11·12) for two zeros before it, 1·2·3/(11·12·13) for three.
    const busy = Array(10).fill(3);
    expect(leftOut(...zeros(2), ...busy)).toBe(0);
    expect(leftOut(...zeros(3), ...busy)).toBe(3);
    // One zero may be anything.
    expect(leftOut(0, ...Array(500).fill(3))).toBe(0);
  });

  it("are kept where little came since, and counted with the gaps among them", () => {
    expect(leftOut(...zeros(50), 4, 5, 4)).toBe(0);
    expect(leftOut(0, Number.NaN, 0, 0, 0, ...Array(12).fill(2))).toBe(5);
    expect(leftOut(...zeros(30))).toBe(0);
    expect(leftOut()).toBe(0);
  });

  it("are no season's, nor a night's", () => {
    const closedWinters = Array.from({ length: 140 }, (_, week) => (week % 52 < 15 ? 0 : 20 + (week % 7)));
    expect(leftOut(...closedWinters)).toBe(0);
    const open = Array.from({ length: 24 * 20 }, (_, hour) => (hour % 24 < 8 || hour % 24 > 18 ? 0 : 9));
    expect(leftOut(...open)).toBe(0);
    const closedMonths = Array.from({ length: 60 }, (_, month) => (month % 12 < 5 ? 0 : 30 + (month % 3)));
    expect(leftOut(...closedMonths)).toBe(0);
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

  it("have no floor by zeros from before they began", () => {
    const falling = Array.from({ length: 12 }, (_, t) => 30.5 - 2.5 * t + (t % 3));
    const options = { horizon: 4, levels: [80] };
    const { point } = forecastSeries([...zeros(20), ...falling], options);
    expect(point).toEqual(forecastSeries(falling, options).point);
    expect(point[3]).toBeLessThan(0);
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
      const { point, median, intervals, total } = forecastSeries(all.slice(0, 91), {
        horizon: 13,
        levels: [80, 95],
      });
      for (const { low, high } of intervals) {
        for (let h = 0; h < 13; h++) {
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
      inside += all.slice(91).filter((value, h) => value >= low[h] && value <= high[h]).length;
    }
    // 520 outcomes, at least 80 % meant: fewer than 388 would be three standard errors below.
    expect(inside).toBeGreaterThanOrEqual(388);
  });

  it("pass no limit outside their bounds", () => {
    const limits = { below: 0, above: 9.5 };
    const bounds = { high: 9.5 };
    const { chances } = forecastSeries(counts(80, 1.5, 1.2, 9), { horizon: 3, levels: [80], limits, bounds });
    expect(chances).toMatchObject([
      { direction: "above", limit: 9.5, any: 0 },
      { direction: "below", limit: 0, any: 0 },
    ]);
  });

  it.each([
    [{ below: 2 }, (value: number) => value < 2],
    [{ below: 3 }, (value: number) => value < 3],
    [{ above: 3 }, (value: number) => value > 3],
    [{ above: 4.4 }, (value: number) => value > 4.4],
  ] as const)("pass a limit between whole numbers as often as they did: %o", (limits, passes) => {
    let chance = 0;
    let passed = 0;
    const series = 24;
    for (let seed = 1; seed <= series; seed++) {
      const all = counts(120, 3, 1.2, 100 + seed);
      const [{ each, limit }] = forecastSeries(all, { horizon: 8, levels: [80], limits }).chances;
      expect(limit).toBe(Object.values(limits)[0]);
      chance += each.reduce((sum, one) => sum + one, 0) / 8 / series;
      passed += all.filter(passes).length / 120 / series;
    }
    // Half a unit off would be 0.08 or more here: the density of the counts, 0.17 to 0.33 a unit at these limits.
    expect(Math.abs(chance - passed)).toBeLessThan(0.05);
  });

  it("keep a bound that is no whole number, in the total too", () => {
    const { intervals, total } = forecastSeries(counts(80, 9, 3, 8), {
      horizon: 3,
      levels: [95],
      bounds: { high: 10.6 },
    });
    for (const bound of intervals[0].high) expect(bound).toBe(10.6);
    expect(total.intervals[0].high).toBeLessThanOrEqual(3 * 10.6);
    expect(total.intervals[0].high).toBeGreaterThanOrEqual(total.point);
  });
});
