import { huber, type LookState } from "./lookState.ts";
import { backwardSolve, factorInPlace, forwardSolve } from "./smallMatrix.ts";

/**
 * One regression through reference and monitored rows together, as if nothing had changed: Huber weights from
 * the reference residuals, weighted least squares. Leaves the Cholesky factor of X'WX, the residuals of the
 * monitored rows, their weighted sum of squares (all rows) and its degrees of freedom in the state.
 */
export function fitNull(state: LookState): void {
  const { start, count, order, columns, terms, factor, moment } = state;
  const { row } = state.work;
  factor.set(state.referenceCross);
  moment.set(state.referenceMoment);
  let squares = state.referenceSquares;
  let rows = state.referenceRows;
  for (let time = start; time < count; time++) {
    const residual = Math.abs(state.cleanedResiduals[time]);
    const weight = state.isGap[time] ? 0 : residual > huber ? huber / residual : 1;
    state.rowWeights[time] = weight;
    if (weight === 0) continue;
    rows++;
    for (let i = 0; i < terms; i++) row[i] = state.termRows[time * terms + i];
    for (let lag = 1; lag <= order; lag++) row[terms + lag - 1] = state.cleaned[time - lag];
    const value = state.cleaned[time];
    for (let i = 0; i < columns; i++) {
      const weighted = weight * row[i];
      moment[i] += weighted * value;
      const base = i * columns;
      for (let j = 0; j <= i; j++) factor[base + j] += weighted * row[j];
    }
    squares += weight * value * value;
  }
  factorInPlace(factor, columns);
  forwardSolve(factor, columns, moment);
  let explained = 0;
  for (let i = 0; i < columns; i++) explained += moment[i] * moment[i];
  backwardSolve(factor, columns, moment);
  state.sumOfSquares = Math.max(squares - explained, 1e-9);
  state.degreesOfFreedom = rows - state.outlierCount - columns;
  for (let time = start; time < count; time++) {
    let residual = state.cleaned[time];
    for (let i = 0; i < terms; i++) residual -= moment[i] * state.termRows[time * terms + i];
    for (let lag = 1; lag <= order; lag++) residual -= moment[terms + lag - 1] * state.cleaned[time - lag];
    state.fitResiduals[time] = residual;
    state.deviations[time] = state.cleaned[time] - state.centreline[time];
  }
}
