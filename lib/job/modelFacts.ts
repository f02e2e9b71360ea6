import { ljungBox } from "../autoregression/ljungBox.ts";
import { isStationary } from "../autoregression/partials.ts";
import { sampleAutocovariances } from "../autoregression/sampleMoments.ts";
import { autocovariances } from "../dynamics/autocovariances.ts";
import { characteristicRoots } from "../dynamics/characteristicRoots.ts";
import { halfLife } from "../dynamics/halfLife.ts";
import { type HalfLifeInterval, halfLifeInterval } from "../dynamics/halfLifeInterval.ts";
import { movingAverageWeights } from "../dynamics/movingAverageWeights.ts";
import { persistence } from "../dynamics/persistence.ts";
import { shockFading } from "../dynamics/shockFading.ts";
import type { DescribingModel } from "../forecast/forecast.ts";
import type { ModelFacts } from "../words/facts.ts";
import type { DescribedLevel } from "./describedLevel.ts";
import { orNull } from "./orNull.ts";

/** Weights and residual autocorrelations kept for pictures. */
const weightsKept = 27;
const residualLags = 20;
/** Fewer values say nothing about permanence. */
const shortestTested = 30;

/** Lag-1.. autocorrelations of the residuals that exist. */
function residualAutocorrelations(residuals: Float64Array): number[] {
  const lags = Math.min(residualLags, Math.floor(residuals.length / 4));
  const covariances = sampleAutocovariances(residuals, lags);
  return Array.from(covariances.subarray(1), (covariance) =>
    covariances[0] > 0 ? covariance / covariances[0] : 0,
  );
}

/** Standard deviation around the long-run level, on the scale of the data; none without shocks, infinite without a return. */
function longRunStandardDeviation(model: DescribingModel, level: number): number {
  const { coefficients, innovationVariance } = model.fit;
  if (!(innovationVariance > 0)) return 0;
  if (!isStationary(coefficients)) return Number.POSITIVE_INFINITY;
  const variance = autocovariances(coefficients, innovationVariance, 0)[0];
  // Log-normal (exact): the level is the median, whose mean is level·exp(v/2).
  if (model.scale === "log") return level * Math.exp(variance / 2) * Math.sqrt(Math.expm1(variance));
  return Math.sqrt(variance);
}

/** The dominant complex pair of the model's roots as a rhythm; none when every root is real. */
function rhythmOf(coefficients: ArrayLike<number>): ModelFacts["rhythm"] {
  const turning = characteristicRoots(coefficients).filter(
    (root) => Number.isFinite(root.period) && root.period > 2,
  );
  const dominant = turning.reduce((best, root) => (root.modulus > best.modulus ? root : best), {
    modulus: 0,
    period: 0,
  });
  return dominant.modulus > 0 ? { length: dominant.period, damping: dominant.modulus } : null;
}

/** Whether there are two values that differ; gaps apart. */
function vary(values: Float64Array): boolean {
  const seen = values.filter((value) => !Number.isNaN(value));
  return seen.some((value) => value !== seen[0]);
}

/**
 * Whether shocks fade, by tests of both hypotheses; with gaps, which the tests do not take, by whether the range of the
 * half-life has an end.
 */
function fadingOf(values: Float64Array, trend: boolean, halfLife: HalfLifeInterval): ModelFacts["fading"] {
  const observed = values.filter((value) => !Number.isNaN(value));
  if (observed.length < shortestTested || observed.every((value) => value === observed[0]))
    return "cannot-tell";
  if (observed.length < values.length) return Number.isFinite(halfLife.high) ? "fades" : "cannot-tell";
  return shockFading(values, { trend, halfLife }).verdict;
}

/** How far a coefficient may move, in its standard errors, before what was simulated around it is simulated anew. */
const smallMove = 0.25;

/** Whether what was simulated for an earlier fit of the same model still describes this one. */
function hardlyMoved(earlier: ModelFacts, { scale, trend, season, fit }: DescribingModel): boolean {
  return (
    earlier.scale === scale &&
    earlier.trend === trend &&
    earlier.season === season &&
    earlier.coefficients.length === fit.coefficients.length &&
    earlier.coefficients.every(
      (value, lag) => Math.abs(value - fit.coefficients[lag]) <= smallMove * fit.standardErrors[lag],
    )
  );
}

/** The range of the half-life by simulation, and whether shocks fade by tests: a third of the time of an account. */
function fadingFacts(
  model: DescribingModel,
  values: Float64Array,
): Pick<ModelFacts, "halfLifeRange" | "fading"> {
  const interval = halfLifeInterval(model.fit, { estimated: model.trend ? "trend" : "estimate" });
  return {
    halfLifeRange: { low: orNull(interval.low), high: orNull(interval.high) },
    fading: fadingOf(values, model.trend, interval),
  };
}

/** Whether a half-life lies in a range, `null` being without end. */
const isWithin = (life: number | null, { low, high }: ModelFacts["halfLifeRange"]) =>
  (life ?? Number.POSITIVE_INFINITY) >= (low ?? Number.POSITIVE_INFINITY) &&
  (life ?? Number.POSITIVE_INFINITY) <= (high ?? Number.POSITIVE_INFINITY);

/**
 * The describing model in numbers that survive JSON; `values` are departures from its terms, on its own scale.
 * `standing` is the account of the last run while its choice stands: where the coefficients hardly moved since, the range
 * of the half-life and the verdict on fading are taken from it.
 */
export function modelFacts(
  model: DescribingModel,
  level: DescribedLevel,
  values: Float64Array,
  standing?: ModelFacts,
): ModelFacts {
  const { fit } = model;
  const lags = Math.max(fit.order + 3, Math.min(residualLags, Math.floor(fit.observations / 5)));
  const life = orNull(halfLife(fit.coefficients));
  const { halfLifeRange, fading } =
    standing && hardlyMoved(standing, model) && isWithin(life, standing.halfLifeRange)
      ? standing
      : fadingFacts(model, values);
  return {
    scale: model.scale,
    trend: model.trend,
    season: model.season,
    relation: model.relation,
    weight: model.weight,
    order: fit.order,
    coefficients: Array.from(fit.coefficients),
    standardErrors: Array.from(fit.standardErrors, (error) => (Number.isFinite(error) ? error : 0)),
    persistence: persistence(fit.coefficients),
    halfLife: life,
    halfLifeRange,
    longRunLevel: level.value,
    longRunLevelStandardError: orNull(level.standardError),
    longRunStandardDeviation: orNull(longRunStandardDeviation(model, level.value)),
    shockSize: Math.sqrt(fit.innovationVariance),
    rhythm: rhythmOf(fit.coefficients),
    weights: Array.from(movingAverageWeights(fit.coefficients, weightsKept)),
    residualAutocorrelations: residualAutocorrelations(fit.residuals),
    ljungBox:
      fit.observations > 2 * lags && vary(fit.residuals)
        ? ljungBox(fit.residuals, { lags, fittedParameters: fit.order })
        : null,
    fading,
    observations: fit.observations,
  };
}
