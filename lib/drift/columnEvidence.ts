import type { ColumnSums } from "./columnSums.ts";
import type { LookState } from "./lookState.ts";
import { factorInPlace, forwardSolve } from "./smallMatrix.ts";

/**
 * ln Bayes factor of adding columns D to the regression y on X with weights W, priors N(0, g_i σ²) on their
 * coefficients, against leaving them out: with A = D'WD − D'WX(X'WX)⁻¹X'WD, v = D'We and S the weighted
 * residual sum of squares of the fit without them,
 * ln BF = −½ ln|I + GA| − ½ df·ln(1 − v'(A + G⁻¹)⁻¹v / S). `sums` are overwritten.
 */
export function columnEvidence(state: LookState, sums: ColumnSums, priors: Float64Array): number {
  const { columns, factor } = state;
  const { size, cross, own, moment } = sums;
  for (let i = 0; i < size; i++) {
    forwardSolve(factor, columns, cross, i * columns);
    for (let j = 0; j <= i; j++) {
      let product = 0;
      for (let k = 0; k < columns; k++) product += cross[i * columns + k] * cross[j * columns + k];
      own[i * size + j] -= product;
    }
  }
  let logPriors = 0;
  for (let i = 0; i < size; i++) {
    own[i * size + i] = Math.max(own[i * size + i], 0) + 1 / priors[i];
    logPriors += Math.log(priors[i]);
  }
  const logDeterminant = factorInPlace(own, size);
  forwardSolve(own, size, moment);
  let explained = 0;
  for (let i = 0; i < size; i++) explained += moment[i] * moment[i];
  const share = Math.min(explained / state.sumOfSquares, 0.999);
  return -0.5 * (logDeterminant + logPriors) - 0.5 * state.degreesOfFreedom * Math.log(1 - share);
}
