import type { AutoregressiveProcess } from "../autoregression/fit.ts";
import { isStationary } from "../autoregression/partials.ts";
import { autocovariances } from "./autocovariances.ts";
import { cumulativeResponse } from "./persistence.ts";

export interface LongRun {
  /** The level that shocks fade back to. */
  readonly level: number;
  /** Variance γ_0 of values around that level; infinite when shocks are permanent. */
  readonly variance: number;
  /** σ²/(1 − Σφ)², n times the variance of a mean of many values: the spectrum at frequency zero. */
  readonly varianceOfMean: number;
}

/**
 * Where a process settles and how widely it varies there.
 *
 * @example longRun({ coefficients: [0.5], mean: 10, innovationVariance: 1 }) // level 10, variance 1.3333, varianceOfMean 4
 */
export function longRun(process: AutoregressiveProcess): LongRun {
  const { coefficients, mean, innovationVariance } = process;
  if (!isStationary(coefficients)) {
    return { level: mean, variance: Number.POSITIVE_INFINITY, varianceOfMean: Number.POSITIVE_INFINITY };
  }
  return {
    level: mean,
    variance: autocovariances(coefficients, innovationVariance, 0)[0],
    varianceOfMean: innovationVariance * cumulativeResponse(coefficients) ** 2,
  };
}

/**
 * Spectral density σ²/|1 − Σ φ_j e^{−2πifj}|² at `frequency` f in cycles a period; its integral over (−½, ½) is the
 * variance (Brockwell & Davis 1991, section 4.4; divide by 2π for radians).
 *
 * @example spectralDensity([0.5], 1, 0) // 4
 */
export function spectralDensity(
  coefficients: ArrayLike<number>,
  innovationVariance: number,
  frequency: number,
): number {
  let re = 1;
  let im = 0;
  for (let j = 0; j < coefficients.length; j++) {
    const angle = 2 * Math.PI * frequency * (j + 1);
    re -= coefficients[j] * Math.cos(angle);
    im += coefficients[j] * Math.sin(angle);
  }
  return innovationVariance / (re * re + im * im);
}
