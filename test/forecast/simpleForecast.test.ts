import { describe, expect, it } from "vitest";
import { forecastSeries } from "../../lib/forecast/forecastSeries.ts";
import { seeded } from "../support/faultProxy.ts";

const gaps = (count: number) => new Array<number>(count).fill(Number.NaN);

describe("a series with next to nothing in it", () => {
  it("is not certain after two equal values", () => {
    const { intervals, total, notes } = forecastSeries([3.5, 3.5], { horizon: 2, levels: [95] });
    expect(notes).toEqual([{ code: "too-short", observed: 2 }]);
    expect(intervals[0].high[0]).toBeGreaterThan(3.5);
    expect(total.intervals[0].low).toBeLessThan(7);
  });

  it("is the less sure the longer ago its last value was, by the square root as a random walk is", () => {
    const width = (values: readonly number[]) => {
      const { intervals, total } = forecastSeries(values, { horizon: 2, levels: [80] });
      const { low, high } = intervals[0];
      return [...low.map((end, h) => high[h] - end), total.intervals[0].high - total.intervals[0].low];
    };
    const [now, then, both] = width([10.5, 12.5, 9.5, 13.5]);
    expect(then / now).toBeCloseTo(Math.SQRT2, 10);
    // w₁ + w₂ varies by 1 + 1 + 1 + 2.
    expect(both / now).toBeCloseTo(Math.sqrt(5), 10);
    const [late, later, lateBoth] = width([10.5, 12.5, 9.5, 13.5, ...gaps(5)]);
    expect(late / now).toBeCloseTo(Math.sqrt(6), 10);
    expect(later / now).toBeCloseTo(Math.sqrt(7), 10);
    // w₆ + w₇: 6 + 6 + 6 + 7.
    expect(lateBoth / now).toBeCloseTo(5, 10);
  });

  it("has steps as large as they were a period where some are over gaps", () => {
    // Steps of 3 over one period and of 6 over four: squares 9 and 36/4, a mean of 9.
    const { intervals } = forecastSeries([1.5, 4.5, ...gaps(3), -1.5], { horizon: 1, levels: [80] });
    const even = forecastSeries([1.5, 4.5, 1.5], { horizon: 1, levels: [80] }).intervals[0];
    expect(intervals[0].high[0] - intervals[0].low[0]).toBeCloseTo(even.high[0] - even.low[0], 10);
  });
});

describe("a series that is mostly zero", () => {
  /** Amounts that come at one period in so many, 3 to 7 of them. */
  const sparse = (count: number, share: number, seed: number) => {
    const random = seeded(seed);
    return Float64Array.from({ length: count }, () => (random() < share ? 3 + 4 * random() : 0));
  };

  it("is told by its mean, whether or not a calendar offers a season", () => {
    for (const period of ["month", "week", undefined] as const) {
      let sum = 0;
      for (let seed = 1; seed <= 60; seed++) {
        const { point, notes } = forecastSeries(sparse(120, 0.06, seed), {
          horizon: 1,
          levels: [80],
          period,
        });
        sum += point[0] / 60;
        expect(notes.map(({ code }) => code)).toContain("intermittent");
      }
      // Mean 0.06·5 = 0.3; of the last 60 values or so, over 60 series, a standard error of 0.02.
      expect(Math.abs(sum - 0.3)).toBeLessThan(0.06);
    }
  });

  it("has its mean for a point, and nothing for a median where more than half are nothing", () => {
    const { point, median } = forecastSeries(sparse(120, 0.3, 4), { horizon: 3, levels: [80] });
    expect([...median]).toEqual([0, 0, 0]);
    for (const mean of point) expect(mean).toBeGreaterThan(0.5);
  });

  it("keeps the model of a shop shut at fixed places of the season", () => {
    const random = seeded(3);
    const months = Float64Array.from({ length: 96 }, (_, t) => (t % 12 < 6 ? 0 : 80 + 20 * random()));
    const { point, notes } = forecastSeries(months, { horizon: 12, levels: [80], period: "month" });
    expect(notes.map(({ code }) => code)).not.toContain("intermittent");
    expect(Math.max(...point.subarray(0, 6))).toBeLessThan(15);
    expect(Math.min(...point.subarray(6))).toBeGreaterThan(70);
  });

  it("is above zero as often as it was, for zero itself passes no limit at zero", () => {
    const values = Float64Array.from({ length: 40 }, (_, t) => (t % 3 === 0 ? 2.5 : 0));
    const [above] = forecastSeries(values, { horizon: 3, levels: [80], limits: { above: 0 } }).chances;
    // A third of the values, those of late counting for more.
    for (const chance of above.each) expect(Math.abs(chance - 1 / 3)).toBeLessThan(0.05);
  });

  it("has a total at least as wide as one of its periods", () => {
    for (let seed = 1; seed <= 200; seed++) {
      const random = seeded(seed);
      const counts = Float64Array.from({ length: 60 }, () => Math.max(0, Math.floor(4 * random()) - 2));
      const { intervals, total } = forecastSeries(counts, { horizon: 4, levels: [80, 95], period: "week" });
      intervals.forEach(({ high }, i) => {
        expect(total.intervals[i].high).toBeGreaterThanOrEqual(Math.max(...high));
      });
    }
  });
});

describe("forecastSeries", () => {
  it("refuses bounds and changes that are no numbers, by name", () => {
    const values = [1, 2, 3, 4, 5, 6, 7, 8, 9];
    const told = (more: object) => () => forecastSeries(values, { horizon: 2, levels: [80], ...more });
    expect(told({ bounds: { low: Number.NaN } })).toThrow("bounds in order");
    expect(told({ changedAt: 2.5 })).toThrow("changedAt");
  });

  it("keeps the record of the steps that are shown where the last values are late", () => {
    const random = seeded(9);
    let level = 0;
    const walk = Array.from({ length: 120 }, () => {
      level += random() - 0.5;
      return level;
    });
    const shown = forecastSeries([...walk, ...gaps(6)], { horizon: 2, levels: [80] }).backTest;
    const all = forecastSeries(walk, { horizon: 8, levels: [80] }).backTest;
    expect([...shown.meanAbsoluteError]).toEqual([...all.meanAbsoluteError.subarray(6)]);
  });
});
