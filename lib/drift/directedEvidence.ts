import type { ColumnSums } from "./columnSums.ts";
import { logMixture } from "./logMixture.ts";
import type { LookState } from "./lookState.ts";
import { forwardSolve } from "./smallMatrix.ts";

/** Prior of one coefficient's change: half-normal deviations of a rise and of a fall, and the share of rises. */
export interface DirectedPrior {
  readonly rise: number;
  readonly fall: number;
  readonly rises: number;
}

/**
 * ln Bayes factor of adding the first column of `sums` alone, against leaving it out, its coefficient a half-normal
 * rise or fall: for each direction the factor of the whole normal (see columnEvidence) times twice the posterior
 * probability of that direction. `sums` are left as they are; `column` is scratch of the regression's size.
 */
export function directedEvidence(
  state: LookState,
  sums: ColumnSums,
  prior: DirectedPrior,
  column: Float64Array,
): number {
  const { columns, factor } = state;
  for (let k = 0; k < columns; k++) column[k] = sums.cross[k];
  forwardSolve(factor, columns, column);
  let information = sums.own[0];
  for (let k = 0; k < columns; k++) information -= column[k] * column[k];
  information = Math.max(information, 1e-9);
  const rise = oneSided(state, information, sums.moment[0], prior.rise);
  const fall = oneSided(state, information, -sums.moment[0], prior.fall);
  return logMixture(rise, fall, prior.rises);
}

function oneSided(state: LookState, information: number, moment: number, deviation: number): number {
  const { sumOfSquares, degreesOfFreedom } = state;
  const precision = information + 1 / (deviation * deviation);
  const share = Math.min((moment * moment) / precision / sumOfSquares, 0.999);
  const ratio = moment / Math.sqrt((precision * sumOfSquares) / degreesOfFreedom);
  return (
    -0.5 * Math.log(1 + deviation * deviation * information) -
    0.5 * degreesOfFreedom * Math.log(1 - share) +
    Math.log(2 * quickNormal(ratio))
  );
}

/** Φ(x) within 2e-4 (Page 1977), enough for a weight and a tenth of the cost; never quite 0. */
function quickNormal(x: number): number {
  return 0.5 * (1 + Math.tanh(Math.sqrt(2 / Math.PI) * (x + 0.044715 * x * x * x))) + 1e-12;
}
