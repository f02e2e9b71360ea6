import { aroundSum, within } from "./bounds.ts";
import type { BackTest, Forecast, ForecastInterval, ForecastNote, ForecastPlan } from "./forecast.ts";
import { normalQuantile } from "./normal.ts";
import { studentFromNormal } from "./student.ts";
import { trivialDescription } from "./trivialDescription.ts";

/** What a series without a model is forecast by: a level, how far one value strays, and whether strays add up. */
export interface SimpleDistribution {
  readonly name: string;
  readonly level: number;
  /** Quantile of a single coming value at a step (1 = next) for a probability. */
  quantile(step: number, probability: number): number;
  /** Quantile of the sum of the horizon. */
  total(horizon: number, probability: number): number;
}

/** A level that stays: the mean of the observed values, each coming value straying as they did. */
export function steadyLevel(observed: Float64Array): SimpleDistribution {
  const { mean, deviation } = moments(observed);
  const freedom = Math.max(1, observed.length - 1);
  const wide = deviation * Math.sqrt(1 + 1 / observed.length);
  return {
    name: "mean of the observed values",
    level: mean,
    quantile: (_, probability) => mean + student(probability, freedom) * wide,
    total: (horizon, probability) =>
      horizon * mean +
      student(probability, freedom) * deviation * Math.sqrt(horizon + horizon ** 2 / observed.length),
  };
}

/**
 * The last value repeated; strays add up like a random walk's, with the size of the observed steps. `values` end with
 * an observed one and may have gaps; `late` more periods have passed since.
 */
export function lastLevel(values: Float64Array, late: number): SimpleDistribution {
  const seen = [...values.keys()].filter((t) => !Number.isNaN(values[t]));
  const last = values[values.length - 1];
  const freedom = Math.max(1, seen.length - 1);
  let variance = 0;
  for (let i = 1; i < seen.length; i++) {
    // A step over a gap has grown over as many periods.
    variance += (values[seen[i]] - values[seen[i - 1]]) ** 2 / (seen[i] - seen[i - 1]) / freedom;
  }
  // Values that have not moved yet do not say how they will: as if one in so many moved by its own size.
  const step = Math.sqrt(variance > 0 ? variance : last ** 2 / seen.length);
  // Var Σ_h w_{late + h} of a random walk: Σ_i Σ_j (late + min(i, j)).
  const ofTotal = (horizon: number) =>
    horizon ** 2 * late + (horizon * (horizon + 1) * (2 * horizon + 1)) / 6;
  return {
    name: "last value",
    level: last,
    quantile: (ahead, probability) => last + student(probability, freedom) * step * Math.sqrt(late + ahead),
    total: (horizon, probability) =>
      horizon * last + student(probability, freedom) * step * Math.sqrt(ofTotal(horizon)),
  };
}

/**
 * Mostly zeros: the mean of the observed values, recent ones counting more (half weight every quarter of the
 * series), with ranges from the observed values themselves, weighted alike.
 */
export function intermittentLevel(observed: Float64Array): SimpleDistribution {
  const count = observed.length;
  const halfLife = Math.max(8, count / 4);
  const weights = observed.map((_, t) => 0.5 ** ((count - 1 - t) / halfLife));
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  const mean = observed.reduce((sum, value, t) => sum + value * weights[t], 0) / total;
  const variance = observed.reduce((sum, value, t) => sum + weights[t] * (value - mean) ** 2, 0) / total;
  const order = [...observed.keys()].sort((a, b) => observed[a] - observed[b]);
  return {
    name: "mean of the recent values, many of them zero",
    level: mean,
    quantile: (_, probability) => {
      let passed = 0;
      for (const t of order) {
        passed += weights[t] / total;
        if (passed >= probability - 1e-12) return observed[t];
      }
      return observed[order[count - 1]];
    },
    total: (horizon, probability) =>
      Math.max(0, horizon * mean + normalQuantile(probability) * Math.sqrt(horizon * variance)),
  };
}

/** A forecast from a simple distribution, with everything a forecast must carry. */
export function simpleForecast(
  values: Float64Array,
  options: ForecastPlan,
  distribution: SimpleDistribution,
  notes: readonly ForecastNote[],
): Forecast {
  const { horizon, levels, limits, bounds, coming } = options;
  const steps = Float64Array.from({ length: horizon }, (_, h) => h + 1);
  /** With what events add to a step, within bounds. */
  const told = (value: number, step: number): number => within(value + coming[step - 1], bounds);
  const intervals: ForecastInterval[] = levels.map((level) => ({
    level,
    low: steps.map((step) =>
      told(Math.min(distribution.level, distribution.quantile(step, 0.5 - level / 200)), step),
    ),
    high: steps.map((step) =>
      told(Math.max(distribution.level, distribution.quantile(step, 0.5 + level / 200)), step),
    ),
  }));
  const point = steps.map((step) => told(distribution.level, step));
  const sum = point.reduce((all, one) => all + one, 0);
  const added = coming.reduce((all, one) => all + one, 0);
  /** Probability of the values up to where `before` ends to hold. */
  const probabilityOf = (before: (value: number) => boolean, step: number): number => {
    let low = 1e-6;
    let high = 1 - 1e-6;
    if (!before(distribution.quantile(step, low))) return 0;
    if (before(distribution.quantile(step, high))) return 1;
    for (let i = 0; i < 40; i++) {
      const middle = (low + high) / 2;
      if (before(distribution.quantile(step, middle))) low = middle;
      else high = middle;
    }
    return high;
  };
  const passing = (["above", "below"] as const).flatMap((direction) => {
    const limit = limits?.[direction];
    if (limit === undefined) return [];
    // A value at the limit passes it neither way.
    const each = steps.map((step) => {
      const at = limit - coming[step - 1];
      return direction === "above"
        ? 1 - probabilityOf((value) => value <= at, step)
        : probabilityOf((value) => value < at, step);
    });
    // Strays of a level are independent; those of a random walk go together, for which this is the upper bound.
    const any = 1 - each.reduce((none, one) => none * (1 - one), 1);
    return [{ direction, limit, each, any: Math.max(any, ...each) }];
  });
  return {
    point,
    median: steps.map((step) => told(distribution.quantile(step, 0.5), step)),
    intervals,
    total: {
      point: sum,
      intervals: intervals.map(({ level, ...each }) => {
        const end = (side: -1 | 1) => added + distribution.total(horizon, 0.5 + (side * level) / 200);
        return { level, ...aroundSum(sum, { low: end(-1), high: end(1) }, each, bounds) };
      }),
    },
    model: trivialDescription(values),
    candidates: [{ name: distribution.name, weight: 1 }],
    notes,
    chances: passing,
    backTest: noBackTest(horizon),
    choice: null,
  };
}

function noBackTest(horizon: number): BackTest {
  return {
    origins: 0,
    meanAbsoluteError: new Float64Array(horizon).fill(Number.NaN),
    naiveMeanAbsoluteError: new Float64Array(horizon).fill(Number.NaN),
    relativeError: Number.NaN,
    coverage80: Number.NaN,
  };
}

function student(probability: number, freedom: number): number {
  return studentFromNormal(normalQuantile(probability), Math.max(3, freedom));
}

function moments(values: Float64Array): { mean: number; deviation: number } {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const power = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return { mean, deviation: Math.sqrt(power / Math.max(1, values.length - 1)) };
}
