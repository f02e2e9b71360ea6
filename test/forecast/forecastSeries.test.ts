import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { Forecast, ForecastOptions } from "../../lib/forecast/forecast.ts";
import { forecastSeries } from "../../lib/forecast/forecastSeries.ts";

const SHAPES: Readonly<Record<string, (t: number, noise: number) => number>> = {
  steady: (_, noise) => 100 + noise,
  growing: (t, noise) => Math.exp(0.03 * t + 0.1 * noise),
  falling: (t, noise) => 50 - 2 * t + noise,
  seasonal: (t, noise) => 40 + 10 * Math.sin((2 * Math.PI * t) / 12) + noise,
  counts: (_, noise) => Math.max(0, Math.round(2 * noise)),
  tiny: (_, noise) => 1e-12 * (3 + noise),
  large: (t, noise) => 1e12 + 1e9 * noise + 1e8 * t,
  line: (t) => 3 + 2 * t,
  exponential: (t) => 2 ** t,
  flatThenStep: (t) => (t < 12 ? 5 : 9),
  cycle: (t) => [1, 5, 2, 8][t % 4],
};

function expectOrdered(forecast: Forecast, { horizon, levels, bounds }: ForecastOptions): void {
  const low = bounds?.low ?? Number.NEGATIVE_INFINITY;
  const high = bounds?.high ?? Number.POSITIVE_INFINITY;
  expect(forecast.point).toHaveLength(horizon);
  for (let h = 0; h < horizon; h++) {
    let within: readonly [number, number] = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
    const byWidth = [...forecast.intervals].sort((a, b) => b.level - a.level);
    expect(byWidth).toHaveLength(levels.length);
    for (const interval of byWidth) {
      const range = [interval.low[h], interval.high[h]] as const;
      expect(range.every(Number.isFinite)).toBe(true);
      expect(range[0]).toBeGreaterThanOrEqual(Math.max(within[0], low));
      expect(range[1]).toBeLessThanOrEqual(Math.min(within[1], high));
      for (const value of [forecast.point[h], forecast.median[h]]) {
        expect(value).toBeGreaterThanOrEqual(range[0]);
        expect(value).toBeLessThanOrEqual(range[1]);
      }
      within = range;
    }
  }
  for (const interval of forecast.total.intervals) {
    expect(interval.low).toBeLessThanOrEqual(forecast.total.point);
    expect(interval.high).toBeGreaterThanOrEqual(forecast.total.point);
    expect(Number.isFinite(interval.low) && Number.isFinite(interval.high)).toBe(true);
  }
  for (const chance of forecast.chances) {
    for (const each of chance.each) expect(each).toBeGreaterThanOrEqual(0);
    expect(chance.any).toBeGreaterThanOrEqual(Math.max(...chance.each));
    expect(chance.any).toBeLessThanOrEqual(1);
  }
}

describe("forecastSeries", () => {
  it("gives finite, ordered ranges within bounds for any kind, length and pattern of gaps", () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...Object.keys(SHAPES)),
        fc.array(fc.double({ min: -3, max: 3, noNaN: true }), { minLength: 1, maxLength: 70 }),
        fc.array(fc.nat(69), { maxLength: 12 }),
        fc.integer({ min: 1, max: 14 }),
        fc.constantFrom(undefined, "month" as const, "quarter" as const, "year" as const),
        fc.boolean(),
        (shape, noise, gaps, horizon, period, bounded) => {
          const values = Float64Array.from(noise, (one, t) => SHAPES[shape](t, one));
          for (const gap of gaps) if (gap > 0 && gap < values.length) values[gap] = Number.NaN;
          const bounds = bounded ? { low: 0, high: 1e15 } : undefined;
          const options = { horizon, levels: [95, 50, 80], period, bounds, limits: { above: 45, below: 0 } };
          expectOrdered(forecastSeries(values, options), options);
        },
      ),
      { numRuns: 400 },
    );
  });

  it("gives the same bytes for the same input", () => {
    const values = Array.from({ length: 80 }, (_, t) => 20 + 5 * Math.sin(t) + ((t * 37) % 11));
    const options = { horizon: 6, levels: [80], limits: { above: 25 }, seed: 7 };
    expect(JSON.stringify(forecastSeries(values, options))).toBe(
      JSON.stringify(forecastSeries(values, options)),
    );
  });

  it("refuses a level, a horizon or values that make no sense, by name", () => {
    expect(() => forecastSeries([1, 2], { horizon: 0, levels: [80] })).toThrow(/horizon/);
    expect(() => forecastSeries([1, 2], { horizon: 1, levels: [100] })).toThrow(/level/);
    expect(() => forecastSeries([1, 2], { horizon: 1, levels: [], seasons: [365.25] })).toThrow(/seasons/);
    expect(() => forecastSeries([1, 2], { horizon: 1, levels: [], bounds: { low: 2, high: 1 } })).toThrow(
      /bounds/,
    );
    expect(() => forecastSeries([1e200, 2], { horizon: 1, levels: [80] })).toThrow(/size/);
    expect(() => forecastSeries([Number.NaN], { horizon: 1, levels: [80] })).toThrow(/observed/);
    expect(() => forecastSeries([1, Number.POSITIVE_INFINITY], { horizon: 1, levels: [80] })).toThrow(
      /values/,
    );
  });
});
