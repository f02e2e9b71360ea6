import { backwardSolve, factorInPlace, forwardSolve } from "./smallMatrix.ts";

/** Least squares on one segment of rows. */
export interface SegmentFit {
  readonly coefficients: Float64Array;
  /** Residual sum of squares divided by the number of rows. */
  readonly variance: number;
  /** d'Qd with Q = X'X / rows. */
  readonly momentAlong: (direction: Float64Array) => number;
}

/** Fits rows `first`..`last` of `design` (stored by row). */
export function segmentFit(
  response: Float64Array,
  design: Float64Array,
  columns: number,
  first: number,
  last: number,
): SegmentFit {
  const rows = last - first + 1;
  const cross = new Float64Array(columns * columns);
  const coefficients = new Float64Array(columns);
  for (let row = first; row <= last; row++)
    for (let i = 0; i < columns; i++) {
      coefficients[i] += design[row * columns + i] * response[row];
      for (let j = 0; j <= i; j++)
        cross[i * columns + j] += design[row * columns + i] * design[row * columns + j];
    }
  factorInPlace(cross, columns);
  forwardSolve(cross, columns, coefficients);
  backwardSolve(cross, columns, coefficients);
  const project = (row: number, along: Float64Array) => {
    let sum = 0;
    for (let i = 0; i < columns; i++) sum += design[row * columns + i] * along[i];
    return sum;
  };
  let squares = 0;
  for (let row = first; row <= last; row++) squares += (response[row] - project(row, coefficients)) ** 2;
  const momentAlong = (direction: Float64Array) => {
    let sum = 0;
    for (let row = first; row <= last; row++) sum += project(row, direction) ** 2;
    return sum / rows;
  };
  return { coefficients, variance: squares / rows, momentAlong };
}
