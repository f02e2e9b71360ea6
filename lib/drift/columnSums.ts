import type { LookState } from "./lookState.ts";

/** Weighted products of some columns D with the regression (D'WX), with themselves (D'WD, lower) and with its residuals (D'We). */
export interface ColumnSums {
  readonly size: number;
  readonly cross: Float64Array;
  readonly own: Float64Array;
  readonly moment: Float64Array;
}

export function emptySums(size: number, columns: number): ColumnSums {
  return {
    size,
    cross: new Float64Array(size * columns),
    own: new Float64Array(size * size),
    moment: new Float64Array(size),
  };
}

export function clearSums(sums: ColumnSums): void {
  sums.cross.fill(0);
  sums.own.fill(0);
  sums.moment.fill(0);
}

export function copySums(from: ColumnSums, to: ColumnSums): void {
  to.cross.set(from.cross);
  to.own.set(from.own);
  to.moment.set(from.moment);
}

/** Adds row `time`, where the columns have the values `row[offset..]`. */
export function addRow(
  state: LookState,
  sums: ColumnSums,
  time: number,
  row: Float64Array,
  offset: number,
): void {
  const weight = state.rowWeights[time];
  if (weight === 0) return;
  const { terms, order, columns, termRows, cleaned } = state;
  const { size, cross, own, moment } = sums;
  const residual = weight * state.fitResiduals[time];
  for (let g = 0; g < size; g++) {
    const value = row[offset + g];
    if (value === 0) continue;
    const weighted = weight * value;
    const base = g * columns;
    for (let i = 0; i < terms; i++) cross[base + i] += weighted * termRows[time * terms + i];
    for (let lag = 1; lag <= order; lag++) cross[base + terms + lag - 1] += weighted * cleaned[time - lag];
    for (let h = 0; h <= g; h++) own[g * size + h] += weighted * row[offset + h];
    moment[g] += value * residual;
  }
}
