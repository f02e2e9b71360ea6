import { centred } from "../numeric/sums.ts";
import { requireObserved, requirePositive, requireValues } from "./checks.ts";
import type { AutoregressiveProcess } from "./fit.ts";
import { GapSystem } from "./gapSystem.ts";
import { coefficientsToPartials } from "./partials.ts";

export interface SmoothedValues {
  /** The values, with E[x_t | everything observed, before and after] at the gaps. */
  readonly values: Float64Array;
  /** Of those expectations; 0 where a value was observed. */
  readonly standardErrors: Float64Array;
}

/**
 * Fills gaps with their expectation given all observed values, earlier and later, at given parameters
 * (fixed-interval smoothing, solved as one band system: see `GapSystem`). Gaps at the ends are filled too, which
 * at the right end gives the forecasts.
 *
 * Throws `RangeError` when the process is not stationary or no value is observed.
 *
 * @example smoothGaps({ coefficients: [0.5], mean: 0, innovationVariance: 1 }, [2, Number.NaN, 2]).values[1] // 1.6
 */
export function smoothGaps(process: AutoregressiveProcess, values: ArrayLike<number>): SmoothedValues {
  requireValues("smoothGaps", "values", values, "gaps-allowed");
  requireObserved("smoothGaps", values, 1);
  requireValues("smoothGaps", "mean", [process.mean], "no-gaps");
  requirePositive("smoothGaps", "innovationVariance", process.innovationVariance);
  coefficientsToPartials(process.coefficients);
  const { filled, missing, inverse, stride } = fillGaps(process, values);
  const standardErrors = new Float64Array(values.length);
  const smoothed = Float64Array.from(values);
  for (let g = 0; g < missing.length && missing[g] < values.length; g++) {
    const t = missing[g];
    smoothed[t] = filled[t] + process.mean;
    standardErrors[t] = Math.sqrt(process.innovationVariance * inverse[g * stride]);
  }
  return { values: smoothed, standardErrors };
}

function fillGaps(process: AutoregressiveProcess, values: ArrayLike<number>) {
  const p = process.coefficients.length;
  const u = new Float64Array(p + 1);
  u[0] = 1;
  for (let j = 0; j < p; j++) u[j + 1] = -process.coefficients[j];
  // The band formula needs more than p values; unobserved ones at the end change nothing.
  const length = Math.max(values.length, p + 1);
  const filled = new Float64Array(length).fill(Number.NaN);
  filled.set(centred(values, process.mean));
  const missing = Int32Array.from(filled.keys()).filter((t) => Number.isNaN(filled[t]));
  carryNearest(filled, missing);
  const system = new GapSystem(length, missing, p);
  if (Number.isNaN(system.factorAt(u))) {
    throw new RangeError("smoothGaps needs a process further from the edge of stationarity");
  }
  const correction = new Float64Array(missing.length);
  system.project(filled, correction, 0);
  system.solveLower(correction, 0);
  system.solveUpper(correction, 0);
  for (let g = 0; g < missing.length; g++) filled[missing[g]] -= correction[g];
  return { filled, missing, inverse: system.inverseWithinBand(), stride: p + 1 };
}

/** A first fill: the value before the gap, or after it at the start. Any fill would do; a near one rounds least. */
function carryNearest(filled: Float64Array, missing: Int32Array): void {
  const first = filled.find((value) => !Number.isNaN(value)) ?? 0;
  for (const t of missing) filled[t] = t > 0 ? filled[t - 1] : first;
}
