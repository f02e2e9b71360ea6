import { ljungBox } from "../autoregression/ljungBox.ts";
import { isStationary } from "../autoregression/partials.ts";
import { sampleAutocovariances } from "../autoregression/sampleMoments.ts";
import { autocovariances } from "../dynamics/autocovariances.ts";
import { characteristicRoots } from "../dynamics/characteristicRoots.ts";
import { halfLife } from "../dynamics/halfLife.ts";
import { movingAverageWeights } from "../dynamics/movingAverageWeights.ts";
import { persistence } from "../dynamics/persistence.ts";
import type { DescribingModel } from "../forecast/forecast.ts";
import type { ModelFacts } from "../words/facts.ts";
import type { DescribedLevel } from "./describedLevel.ts";
import { orNull } from "./orNull.ts";
import type { SimulatedFading } from "./simulateFading.ts";

/** Weights and residual autocorrelations kept for pictures. */
const weightsKept = 27;
const residualLags = 20;

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

/** The describing model in numbers that survive JSON, with what was simulated for it. */
export function modelFacts(
  model: DescribingModel,
  level: DescribedLevel,
  { halfLifeRange, fading }: SimulatedFading,
): ModelFacts {
  const { fit } = model;
  const lags = Math.max(fit.order + 3, Math.min(residualLags, Math.floor(fit.observations / 5)));
  return {
    scale: model.scale,
    trend: model.trend,
    season: model.season,
    weight: model.weight,
    order: fit.order,
    coefficients: Array.from(fit.coefficients),
    standardErrors: Array.from(fit.standardErrors, (error) => (Number.isFinite(error) ? error : 0)),
    persistence: persistence(fit.coefficients),
    halfLife: orNull(halfLife(fit.coefficients)),
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
