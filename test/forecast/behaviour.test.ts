import { describe, expect, it } from "vitest";
import { predict } from "../../lib/autoregression/predict.ts";
import { shockContributions } from "../../lib/dynamics/shockContributions.ts";
import { averageForecast } from "../../lib/forecast/averageForecast.ts";
import { describedPath, describeSeries } from "../../lib/forecast/describingModel.ts";
import { describingColumns } from "../../lib/forecast/describingTerms.ts";
import { forecastSeries } from "../../lib/forecast/forecastSeries.ts";
import { normalDraws } from "../../lib/forecast/normalDraws.ts";

/** AR(1) about a level, from its stationary distribution. */
function process(count: number, coefficient: number, seed: number, level = 100): Float64Array {
  const draw = normalDraws(seed);
  let deviation = draw() / Math.sqrt(1 - coefficient ** 2);
  return Float64Array.from({ length: count }, () => {
    deviation = coefficient * deviation + draw();
    return level + deviation;
  });
}

describe("the ranges of forecastSeries", () => {
  it("hold stationary, drifting and growing series as often as they say", () => {
    const kinds: readonly ((seed: number) => Float64Array)[] = [
      (seed) => process(128, 0.5, seed),
      (seed) => {
        let level = 0;
        return process(128, 0, seed, 0.1).map((step) => {
          level += step;
          return 200 + level;
        });
      },
      (seed) => process(128, 0.8, seed, 0).map((value, t) => Math.exp(3 + 0.01 * t + 0.05 * value)),
    ];
    for (const kind of kinds) {
      let [inside80, inside95, total] = [0, 0, 0];
      for (let seed = 1; seed <= 60; seed++) {
        const values = kind(seed);
        const { intervals } = forecastSeries(values.subarray(0, 120), { horizon: 8, levels: [80, 95] });
        for (let h = 0; h < 8; h++) {
          const actual = values[120 + h];
          if (actual >= intervals[0].low[h] && actual <= intervals[0].high[h]) inside80++;
          if (actual >= intervals[1].low[h] && actual <= intervals[1].high[h]) inside95++;
          total++;
        }
      }
      // 60 independent series of 8 correlated steps: three standard errors are about 12 and 6 points.
      expect(Math.abs(inside80 / total - 0.8)).toBeLessThan(0.12);
      expect(inside95 / total).toBeGreaterThan(0.89);
    }
  });

  it("stay within sight of a few values that are noise", () => {
    const draw = normalDraws(12);
    for (let one = 0; one < 300; one++) {
      const values = Float64Array.from({ length: 8 + (one % 9) }, () => 10 * Math.exp(0.4 * draw()));
      const period = one % 2 === 0 ? "quarter" : "month";
      const { median, intervals } = forecastSeries(values, { horizon: 8, levels: [80], period });
      const [least, most] = [Math.min(...values), Math.max(...values)];
      const seen = most - least;
      // A wandering slope that foretold one step by luck must not carry them away.
      expect(Math.max(...median)).toBeLessThan(most + 2 * seen);
      expect(Math.min(...median)).toBeGreaterThan(least - 2 * seen);
      expect(Math.max(...intervals[0].high)).toBeLessThan(most + 20 * seen);
    }
  });

  it("grow with the unit of the series and move with its level", () => {
    const values = process(90, 0.6, 3);
    const options = { horizon: 5, levels: [80] };
    const plain = forecastSeries(values, options);
    const scaled = forecastSeries(
      values.map((value) => 1000 * value),
      options,
    );
    plain.point.forEach((value, h) => {
      expect(scaled.point[h] / 1000).toBeCloseTo(value, 6);
      expect(scaled.intervals[0].high[h] / 1000).toBeCloseTo(plain.intervals[0].high[h], 6);
    });
  });

  it("give a limit at the upper bound of the 80 % range a chance of one in ten", () => {
    const values = process(150, 0.7, 5);
    const { intervals } = forecastSeries(values, { horizon: 4, levels: [80] });
    const [{ each, any }] = forecastSeries(values, {
      horizon: 4,
      levels: [80],
      limits: { above: intervals[0].high[0] },
    }).chances;
    expect(each[0]).toBeCloseTo(0.1, 3);
    expect(any).toBeGreaterThan(each[0]);
  });
});

describe("forecastSeries", () => {
  it("follows a season and a trend into the future", () => {
    const draw = normalDraws(6);
    const shape = (t: number) => 50 + 0.5 * t + 8 * Math.sin((2 * Math.PI * t) / 12);
    const values = Float64Array.from({ length: 96 }, (_, t) => shape(t) + 0.5 * draw());
    const { median } = forecastSeries(values, { horizon: 12, levels: [80], period: "month" });
    median.forEach((value, h) => {
      expect(Math.abs(value - shape(96 + h))).toBeLessThan(2);
    });
  });

  it("starts after the last entry when the latest periods were not observed", () => {
    const line = Array.from({ length: 40 }, (_, t) => 10 + t);
    const open = [...line.slice(0, 37), Number.NaN, Number.NaN, Number.NaN];
    const whole = forecastSeries(line, { horizon: 3, levels: [80] }).median;
    forecastSeries(open, { horizon: 3, levels: [80] }).median.forEach((value, h) => {
      expect(Math.abs(value - whole[h])).toBeLessThan(0.5);
    });
  });

  it("says what it could not model: constant, short, mostly gaps, mostly zeros", () => {
    const code = (values: readonly number[]) =>
      forecastSeries(values, { horizon: 2, levels: [80] }).notes[0]?.code;
    expect(code(Array(30).fill(7))).toBe("constant");
    expect(code([1, 4, 2])).toBe("too-short");
    expect(code(Array.from({ length: 60 }, (_, t) => (t % 4 === 0 ? t % 7 : Number.NaN)))).toBe(
      "mostly-gaps",
    );
    expect(code(Array.from({ length: 60 }, (_, t) => (t % 3 === 0 ? 1 + (t % 5) : 0)))).toBe("intermittent");
  });

  it("never goes below zero for counts that are mostly zeros, and keeps their mean", () => {
    const counts = Array.from({ length: 120 }, (_, t) => (t % 4 === 0 ? 4 : 0));
    const { point, intervals, total } = forecastSeries(counts, { horizon: 8, levels: [80, 95] });
    expect(point[0]).toBeCloseTo(1, 1);
    expect(Math.min(...intervals[1].low, total.intervals[1].low)).toBeGreaterThanOrEqual(0);
    expect(intervals[1].high[0]).toBe(4);
  });

  it("does not take a season of zeros for intermittence", () => {
    const open = Array.from({ length: 72 }, (_, t) => (t % 12 < 6 ? 0 : 20 + (t % 12) + ((t * 5) % 3)));
    const { notes, median } = forecastSeries(open, { horizon: 12, levels: [80], period: "month" });
    expect(notes.map(({ code }) => code)).not.toContain("intermittent");
    for (let h = 0; h < 12; h++) expect(median[h] > 13).toBe(h >= 6);
  });

  /** A level that jumps every 24 periods and is still in between: nothing beats the last value. */
  function jumps(): number[] {
    const draw = normalDraws(12);
    let level = 100;
    return Array.from({ length: 400 }, (_, t) => {
      if (t % 24 === 0) level += 10 * draw();
      return level;
    });
  }

  it("uses the naive forecast where the record says that it does better", () => {
    const values = jumps();
    const forecast = forecastSeries(values, { horizon: 4, levels: [80] });
    const naive = forecast.notes.find((note) => note.code === "naive-used");
    expect(naive).toBeDefined();
    expect(forecast.backTest.relativeError).toBeGreaterThanOrEqual(1);
    for (const value of forecast.median) expect(Math.abs(value - values[399])).toBeLessThan(1);
  });

  it("ranges a naive forecast of the next period by the same evidence, however few more are asked for", () => {
    const values = jumps();
    const [one, four] = [1, 4].map((horizon) => forecastSeries(values, { horizon, levels: [80, 95] }));
    expect(one.notes.map(({ code }) => code)).toContain("naive-used");
    one.intervals.forEach(({ low, high }, level) => {
      expect(low[0]).toBe(four.intervals[level].low[0]);
      expect(high[0]).toBe(four.intervals[level].high[0]);
    });
  });

  it("takes the freedom of a naive forecast's ranges from the values that were observed", () => {
    const values = Float64Array.from(jumps(), (value, t) => (t % 4 === 1 ? Number.NaN : value));
    const { average } = averageForecast(values, [], 4, undefined);
    expect(average.naive).toBe(true);
    // A sixth of 300 of 400.
    expect(average.calibration.freedom).toBe(50);
  });

  it("starts from the new level after a change that it is told of", () => {
    const values = process(80, 0.3, 9).map((value, t) => (t < 72 ? value : value + 25));
    const told = forecastSeries(values, { horizon: 6, levels: [80], changedAt: 72 });
    for (const value of told.median) expect(Math.abs(value - 125)).toBeLessThan(3);
  });

  it("starts from the first observed value after a change, or after the longest past that is looked at", () => {
    const options = { horizon: 6, levels: [80], seasons: [] };
    const values = process(130, 0.3, 9).map((value, t) => (t < 60 ? value : value + 25));
    values.fill(Number.NaN, 60, 63);
    values[90] += 40;
    const told = forecastSeries(values, { ...options, changedAt: 60 });
    expect(told).toEqual(forecastSeries(values, { ...options, changedAt: 63 }));
    expect(told.notes).toContainEqual({ code: "outliers-damped", indexes: [90] });
    const long = process(5003, 0.3, 9);
    long.fill(Number.NaN, 2, 5);
    expect(forecastSeries(long, options)).toEqual(forecastSeries(long, { ...options, changedAt: 5 }));
  });

  it("lets the shares of its candidates sum to one, the describing model's among them", () => {
    const { candidates, model } = forecastSeries(process(90, 0.6, 21), { horizon: 5, levels: [80] });
    expect(candidates.reduce((sum, { weight }) => sum + weight, 0)).toBeCloseTo(1, 10);
    const own = candidates.find(({ name }) => name.endsWith("describing model"))?.weight ?? 0;
    expect(model.weight).toBe(own);
  });
});

describe("the describing model", () => {
  it("forecasts as the core's predict does from the same fit", () => {
    const values = process(120, 0.6, 33);
    const description = describeSeries(values);
    const scaled = description.scale === "log" ? values.map(Math.log) : values;
    expect(description.trend).toBe(false);
    const path = describedPath(description, scaled, 120, 9);
    predict(description.fit, scaled, { horizon: 9 }).mean.forEach((value, h) => {
      expect(path[h]).toBeCloseTo(value, 9);
    });
  });

  it("is the sum of its terms and of past shocks by their moving-average weights, to rounding", () => {
    const draw = normalDraws(17);
    let deviation = 0;
    const values = Float64Array.from({ length: 150 }, (_, t) => {
      deviation = 0.7 * deviation + draw();
      return 80 + 0.4 * t + 6 * Math.cos((2 * Math.PI * t) / 4) + deviation;
    });
    const description = describeSeries(values, { period: "quarter" });
    const { fit, trend, season, regressors } = description;
    expect([trend, season]).toEqual([true, 4]);
    const scaled = description.scale === "log" ? values.map(Math.log) : values;
    const terms = fit.regression?.coefficients ?? [];
    const level = (columns: readonly Float64Array[], t: number) =>
      columns.reduce((sum, column, c) => sum + terms[c] * column[t], 0);
    const departures = scaled.map((value, t) => value - level(regressors, t));
    const { shocks, earlier } = shockContributions({ ...fit, mean: 0 }, departures, { horizon: 6, last: 20 });
    const ahead = describingColumns(trend, season, 150, 6, 150);
    describedPath(description, scaled, 150, 6).forEach((value, h) => {
      const effects = shocks.reduce((sum, { effects }) => sum + effects[h], 0);
      expect(Math.abs(value - level(ahead, h) - effects - earlier[h])).toBeLessThan(1e-9);
    });
  });

  it("finds the growth of a series that grows by percentages on the logarithm", () => {
    const values = process(120, 0.5, 41, 0).map((value, t) => Math.exp(2 + 0.03 * t + 0.05 * value));
    const { scale, trend } = describeSeries(values);
    expect([scale, trend]).toEqual(["log", true]);
  });
});
