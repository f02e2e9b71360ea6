import { type ColumnChoice, type ColumnPlan, planColumns, writeRows } from "./changeColumns.ts";
import type { LookState } from "./lookState.ts";
import { backwardSolve, factorInPlace } from "./smallMatrix.ts";

/** Everything that the explanations of one look share. */
export interface Explainer {
  readonly state: LookState;
  readonly plan: ColumnPlan;
  /** Weighted products of null columns and value over the reference rows, with the loss those rows add. */
  readonly base: Float64Array;
  /** Monitored rows for the change time last set. */
  readonly rows: Float64Array;
  readonly weights: Float64Array;
  readonly matrix: Float64Array;
  readonly solution: Float64Array;
  change: number;
}

export function openExplainer(state: LookState): Explainer {
  const plan = planColumns(state);
  const { size } = plan;
  const explainer: Explainer = {
    state,
    plan,
    base: new Float64Array((state.columns + 1) ** 2),
    rows: new Float64Array((state.count - state.start) * size),
    weights: new Float64Array(state.count - state.start),
    matrix: new Float64Array(size * size),
    solution: new Float64Array(size),
    change: -1,
  };
  sumReference(explainer);
  return explainer;
}

/** Student's weight of a squared standardised residual, and what its weighted square lacks to the loss. */
const weightOf = (nu: number, z2: number) => (nu + 1) / (nu + z2);
const lackOf = (nu: number, z2: number) => (nu + 1) * Math.log1p(z2 / nu) - weightOf(nu, z2) * z2;

function sumReference({ state, base }: Explainer): void {
  const { reference, order, terms, columns, start, cleaned } = state;
  const { degreesOfFreedom: nu, studentScale: scale } = reference;
  const size = columns + 1;
  const row = new Float64Array(size);
  for (let time = order; time < start; time++) {
    if (state.isGap[time]) continue;
    for (let i = 0; i < terms; i++) row[i] = state.termRows[time * terms + i];
    for (let lag = 1; lag <= order; lag++) row[terms + lag - 1] = cleaned[time - lag];
    row[columns] = cleaned[time];
    const z2 = (state.residuals[time] / scale) ** 2;
    const weight = weightOf(nu, z2) / (scale * scale);
    for (let i = 0; i < size; i++)
      for (let j = 0; j <= i; j++) base[i * size + j] += weight * row[i] * row[j];
    base[size * size - 1] += lackOf(nu, z2);
  }
}

export function setChange(explainer: Explainer, change: number): void {
  explainer.change = change;
  writeRows(explainer.state, explainer.plan, change, explainer.rows);
}

/**
 * Log marginal likelihood, up to a constant, of a change at the time last set with the columns `chosen` and the
 * shock size times e^`logRatio`: Student loss by one reweighting of least squares (the weighted square plus what
 * it lacks to the loss majorises the loss), flat priors on the null columns, normal ones on the change, the
 * innovation variance integrated out. `solution` then holds the coefficients.
 */
export function explain(explainer: Explainer, chosen: readonly ColumnChoice[], logRatio: number): number {
  const { state, weights, change } = explainer;
  const { start, count, reference, columns } = state;
  const { degreesOfFreedom: nu, studentScale } = reference;
  const scaleAt = (time: number) => (time < change ? studentScale : studentScale * Math.exp(logRatio));
  let after = 0;
  for (let time = start; time < count; time++) {
    weights[time - start] = state.isGap[time] ? 0 : 1 / scaleAt(time) ** 2;
    if (time >= change && !state.isGap[time]) after++;
  }
  solve(explainer, chosen, 0);
  let lack = 0;
  for (let time = start; time < count; time++) {
    if (state.isGap[time]) continue;
    const z2 = (residualOf(explainer, chosen, time) / scaleAt(time)) ** 2;
    weights[time - start] *= weightOf(nu, z2);
    lack += lackOf(nu, z2);
  }
  const logDeterminant = solve(explainer, chosen, lack);
  const size = columns + chosen.length + 1;
  const logRest = 2 * Math.log(explainer.matrix[size * size - 1]);
  let logPriors = 0;
  for (const { prior } of chosen) logPriors += Math.log(prior);
  return (
    -after * logRatio - 0.5 * (logDeterminant - logRest + logPriors) - 0.5 * state.degreesOfFreedom * logRest
  );
}

/** Factors the weighted products of the chosen columns and solves for their coefficients; returns ln det. */
function solve(explainer: Explainer, chosen: readonly ColumnChoice[], lack: number): number {
  const { state, plan, base, rows, weights, matrix, solution } = explainer;
  const { columns, start, count } = state;
  const size = columns + chosen.length + 1;
  const last = size - 1;
  matrix.fill(0, 0, size * size);
  for (let i = 0; i < columns; i++)
    for (let j = 0; j <= i; j++) matrix[i * size + j] = base[i * (columns + 1) + j];
  for (let j = 0; j < columns; j++) matrix[last * size + j] = base[columns * (columns + 1) + j];
  matrix[last * size + last] = base[(columns + 1) ** 2 - 1] + lack;
  for (let i = 0; i < chosen.length; i++) matrix[(columns + i) * (size + 1)] = 1 / chosen[i].prior;
  for (let time = start; time < count; time++) {
    const weight = weights[time - start];
    if (weight === 0) continue;
    const offset = (time - start) * plan.size;
    for (let i = 0; i < size; i++) {
      const value = weight * rows[offset + placeOf(explainer, chosen, i)];
      if (value === 0) continue;
      for (let j = 0; j <= i; j++)
        matrix[i * size + j] += value * rows[offset + placeOf(explainer, chosen, j)];
    }
  }
  const logDeterminant = factorInPlace(matrix, size);
  for (let i = 0; i < last; i++) solution[i] = matrix[last * size + i];
  backwardSolve(matrix, last, solution, 0, size);
  return logDeterminant;
}

function placeOf({ state, plan }: Explainer, chosen: readonly ColumnChoice[], i: number): number {
  const { columns } = state;
  if (i < columns) return i;
  return i < columns + chosen.length ? chosen[i - columns].column : plan.size - 1;
}

function residualOf(explainer: Explainer, chosen: readonly ColumnChoice[], time: number): number {
  const { state, plan, rows, solution } = explainer;
  const offset = (time - state.start) * plan.size;
  let residual = rows[offset + plan.size - 1];
  for (let i = 0; i < state.columns + chosen.length; i++)
    residual -= solution[i] * rows[offset + placeOf(explainer, chosen, i)];
  return residual;
}
