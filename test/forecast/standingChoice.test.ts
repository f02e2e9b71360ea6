import { describe, expect, it } from "vitest";
import { describeAs } from "../../lib/forecast/describingModel.ts";
import { forecastSeries } from "../../lib/forecast/forecastSeries.ts";
import { randomNormal } from "../../lib/numeric/randomNormal.ts";

const options = { horizon: 8, levels: [80, 95], period: "week" } as const;

/** AR(1) around a level, coefficient 0.7. */
function series(count: number, seed: number, level = 100): Float64Array {
  const normal = randomNormal(seed);
  const values = new Float64Array(count);
  for (let t = 0, last = 0; t < count; t++) {
    last = 0.7 * last + normal();
    values[t] = level + last;
  }
  return values;
}

/** Largest distance of two forecasts, points and ends of ranges, in parts of the widest range. */
function apart(one: ReturnType<typeof forecastSeries>, other: typeof one): number {
  const numbers = (forecast: typeof one) => [
    ...forecast.point,
    ...forecast.intervals.flatMap(({ low, high }) => [...low, ...high]),
  ];
  const width = one.intervals[1].high[7] - one.intervals[1].low[7];
  const others = numbers(other);
  return Math.max(...numbers(one).map((value, i) => Math.abs(value - others[i]) / width));
}

describe("a forecast by what an earlier one decided", () => {
  it("is the same forecast when nothing came since, also after a round trip through JSON", () => {
    for (const level of [100, 0]) {
      const values = series(150, 3, level);
      const first = forecastSeries(values, options);
      const choice = JSON.parse(JSON.stringify(first.choice));
      const second = forecastSeries(values, { ...options, choice });
      // Weights are kept to six digits.
      expect(apart(first, second)).toBeLessThan(1e-4);
      expect(second.choice).toBe(choice);
      expect(second.backTest).toEqual(first.backTest);
    }
  });

  it("stands for a straight line too, which no likelihood describes", () => {
    const line = Float64Array.from({ length: 60 }, (_, t) => 10 + 2 * t);
    const choice = JSON.parse(JSON.stringify(forecastSeries(line, options).choice));
    const second = forecastSeries(line, { ...options, choice });
    expect(second.choice).toBe(choice);
    second.median.forEach((value, h) => {
      expect(value).toBeCloseTo(130 + 2 * h, 6);
    });
  });

  it("keeps to a naive forecast that did better", () => {
    const normal = randomNormal(1);
    let found = 0;
    for (let walk = 0; walk < 30; walk++) {
      const values = new Float64Array(90);
      for (let t = 1; t < 90; t++) values[t] = values[t - 1] + normal();
      const first = forecastSeries(values, options);
      if (!first.notes.some(({ code }) => code === "naive-used")) continue;
      found++;
      const second = forecastSeries(values, { ...options, choice: first.choice ?? undefined });
      expect(second).toEqual(first);
    }
    expect(found).toBeGreaterThan(1);
  });

  it("follows new values with models fitted to all of them", () => {
    const values = series(160, 5);
    const choice = forecastSeries(values.subarray(0, 156), options).choice ?? undefined;
    const lifted = values.map((value, t) => (t === 159 ? value + 10 : value));
    const before = forecastSeries(values, { ...options, choice });
    const after = forecastSeries(lifted, { ...options, choice });
    expect(after.point[0] - before.point[0]).toBeGreaterThan(1);
    // The describing model of the same plan is the exact fit to all 160 values.
    const plan = choice?.describing ?? { scale: "raw", trend: false, season: 0, order: 0 };
    expect(before.model.fit).toEqual(describeAs(values, plan).fit);
  });

  it("decides anew for another horizon, another season, a much longer past, or values that passed zero", () => {
    const values = series(150, 7);
    const choice = forecastSeries(values, options).choice ?? undefined;
    const fresh = (given: Float64Array, asked: Parameters<typeof forecastSeries>[1]) => {
      const forecast = forecastSeries(given, { ...asked, choice });
      expect(forecast.choice).not.toBe(choice);
      expect(forecast).toEqual(forecastSeries(given, asked));
    };
    fresh(values, { ...options, horizon: 5 });
    fresh(values.subarray(0, 130), options);
    fresh(series(170, 7), options);
    fresh(values, { ...options, seasons: [13] });
    fresh(
      values.map((value) => value - 100),
      options,
    );
  });
});
