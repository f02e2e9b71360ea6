import { observedMean } from "../numeric/sums.ts";

/**
 * Values and columns made ready for the likelihood: gaps at the ends cut off, columns orthogonal with unit mean
 * square, the values freed of their least-squares fit and divided by its root mean square, gaps inside filled by
 * straight lines (any fill gives the same likelihood; a close one cancels least).
 */
export interface LikelihoodDesign {
  /** Work series, then one orthogonal column a regressor, each `length` long. */
  readonly series: readonly Float64Array[];
  /** 0-based places of the gaps inside. */
  readonly missing: Int32Array;
  readonly length: number;
  readonly observations: number;
  readonly scale: number;
  /** Least-squares coefficients of the given columns. */
  readonly base: Float64Array;
  /** Column j of the upper triangle (k² by row) makes orthogonal column j from the given ones. */
  readonly triangle: Float64Array;
}

/**
 * Builds the design. Throws `RangeError` when columns are not independent over the observed rows, or when they
 * explain the values entirely.
 */
export function likelihoodDesign(
  values: ArrayLike<number>,
  columns: readonly ArrayLike<number>[],
): LikelihoodDesign {
  let first = 0;
  let end = values.length;
  while (Number.isNaN(values[first])) first++;
  while (Number.isNaN(values[end - 1])) end--;
  const length = end - first;
  const work = new Float64Array(length);
  const missing: number[] = [];
  // A number near the values taken off first keeps their digits; a constant column gives it back.
  const hasLevel = columns.some((column) => isConstant(column));
  const shift = hasLevel ? observedMean(values) : 0;
  for (let t = 0; t < length; t++) {
    work[t] = values[first + t] - shift;
    if (Number.isNaN(work[t])) missing.push(t);
  }
  const gaps = Int32Array.from(missing);
  const observations = length - gaps.length;
  const original = rootMeanSquare(work, gaps);
  const { orthogonal, triangle } = orthogonalise(columns, first, length, gaps);
  const base = regress(work, orthogonal, triangle, gaps);
  addShift(base, columns, shift);
  const scale = rootMeanSquare(work, gaps);
  if (!(scale > original * 1e-13)) {
    throw new RangeError(
      "fitAutoregression needs values that the mean or regressors do not explain entirely",
    );
  }
  for (let t = 0; t < length; t++) work[t] /= scale;
  fillLinearly(work, gaps);
  return {
    series: [work, ...orthogonal],
    missing: gaps,
    length,
    observations,
    scale,
    base,
    triangle,
  };
}

/** True when all entries are one value other than zero. */
export function isConstant(column: ArrayLike<number>): boolean {
  for (let i = 1; i < column.length; i++) if (column[i] !== column[0]) return false;
  return column.length > 0 && column[0] !== 0;
}

/** Modified Gram–Schmidt, twice (Giraud et al. 2005), over the observed rows; the gap rows follow along. */
function orthogonalise(
  columns: readonly ArrayLike<number>[],
  first: number,
  length: number,
  gaps: Int32Array,
): { orthogonal: Float64Array[]; triangle: Float64Array } {
  const k = columns.length;
  const orthogonal: Float64Array[] = [];
  const triangle = new Float64Array(k * k);
  for (let j = 0; j < k; j++) {
    const column = new Float64Array(length);
    for (let t = 0; t < length; t++) column[t] = columns[j][first + t];
    const before = rootMeanSquare(column, gaps);
    triangle[j * k + j] = 1;
    for (let pass = 0; pass < 2; pass++) {
      for (let i = 0; i < j; i++) {
        const share = meanProduct(column, orthogonal[i], gaps);
        for (let t = 0; t < length; t++) column[t] -= share * orthogonal[i][t];
        for (let row = 0; row <= i; row++) triangle[row * k + j] -= share * triangle[row * k + i];
      }
    }
    const size = rootMeanSquare(column, gaps);
    if (!(size > before * 1e-10)) {
      throw new RangeError(
        `fitAutoregression needs independent regressors, but column ${j} follows from the ones before it`,
      );
    }
    for (let t = 0; t < length; t++) column[t] /= size;
    for (let row = 0; row <= j; row++) triangle[row * k + j] /= size;
    orthogonal.push(column);
  }
  return { orthogonal, triangle };
}

/** Takes the fit off `work` and returns the coefficients of the given columns. */
function regress(
  work: Float64Array,
  orthogonal: readonly Float64Array[],
  triangle: Float64Array,
  gaps: Int32Array,
): Float64Array {
  const k = orthogonal.length;
  const base = new Float64Array(k);
  for (let pass = 0; pass < 2; pass++) {
    for (let j = 0; j < k; j++) {
      const share = meanProduct(work, orthogonal[j], gaps);
      for (let t = 0; t < work.length; t++) work[t] -= share * orthogonal[j][t];
      for (let row = 0; row <= j; row++) base[row] += share * triangle[row * k + j];
    }
  }
  return base;
}

function addShift(base: Float64Array, columns: readonly ArrayLike<number>[], shift: number): void {
  const constant = columns.findIndex((column) => isConstant(column));
  if (constant >= 0) base[constant] += shift / columns[constant][0];
}

/** Mean of products over the rows that are not gaps; `gaps` is ascending. */
function meanProduct(a: Float64Array, b: Float64Array, gaps: Int32Array): number {
  let sum = 0;
  let nextGap = 0;
  for (let t = 0; t < a.length; t++) {
    if (t === gaps[nextGap]) nextGap++;
    else sum += a[t] * b[t];
  }
  return sum / (a.length - gaps.length);
}

function rootMeanSquare(a: Float64Array, gaps: Int32Array): number {
  let largest = 0;
  let nextGap = 0;
  for (let t = 0; t < a.length; t++) {
    if (t === gaps[nextGap]) nextGap++;
    else if (Math.abs(a[t]) > largest) largest = Math.abs(a[t]);
  }
  if (largest === 0) return 0;
  let sum = 0;
  nextGap = 0;
  for (let t = 0; t < a.length; t++) {
    if (t === gaps[nextGap]) nextGap++;
    else sum += (a[t] / largest) ** 2;
  }
  return largest * Math.sqrt(sum / (a.length - gaps.length));
}

function fillLinearly(work: Float64Array, gaps: Int32Array): void {
  for (let g = 0; g < gaps.length; g++) {
    const from = gaps[g] - 1;
    let to = gaps[g] + 1;
    while (Number.isNaN(work[to])) to++;
    for (let t = from + 1; t < to; t++) {
      work[t] = work[from] + ((work[to] - work[from]) * (t - from)) / (to - from);
    }
    while (gaps[g + 1] < to) g++;
  }
}
