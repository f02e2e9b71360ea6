import { bestPartitions } from "./bestPartitions.ts";
import { argmaxQuantile } from "./dateInterval.ts";
import { type SegmentFit, segmentFit } from "./segmentFit.ts";
import { segmentSums } from "./segmentSums.ts";
import { supF } from "./supF.ts";
import { supFPValue } from "./supFPValue.ts";

export interface BreakOptions {
  /** Columns of length n besides the constant. */
  readonly regressors?: readonly ArrayLike<number>[];
  /** Lags of the values among the columns; default 0, a level that may step. */
  readonly order?: number;
  /** Default 5, or fewer where segments do not fit. */
  readonly maxBreaks?: number;
  /** Shortest segment: below one a share of the rows (default 0.15), else a number of rows. */
  readonly minSegment?: number;
  /** What chooses the number of breaks; default `bic`. `lwz` (Liu, Wu and Zidek 1997) asks for more evidence. */
  readonly criterion?: "bic" | "lwz";
}

export interface Breaks {
  /** `index`: the first value of the new behaviour, in a 95 % range of dates, which may pass the ends. */
  readonly breaks: readonly { readonly index: number; readonly low: number; readonly high: number }[];
  /** For each number of breaks. */
  readonly criteria: readonly {
    readonly breaks: number;
    readonly indexes: readonly number[];
    readonly sumOfSquares: number;
    readonly bic: number;
    readonly lwz: number;
  }[];
  /** Largest Chow statistic over all single breaks, on the χ² scale. */
  readonly supF: number;
  /** Of `supF`, asymptotic. */
  readonly pValue: number;
}

/**
 * Breaks in the past: the regression of each value on a constant, `order` earlier values and `regressors`, cut
 * into segments of least total squares (Bai and Perron 2003), their number by BIC or LWZ, each date with the
 * interval of Bai (1997) that lets regressor moments and error variance differ between the sides. supF (Andrews
 * 1993) tests one break against none. Rows that touch a gap (`NaN`) are left out.
 *
 * @throws RangeError when there are too few rows for two segments
 * @example findBreaks(nile).breaks // [{ index: 28, low: 25, high: 32 }]: the flow falls after 1898
 */
export function findBreaks(values: ArrayLike<number>, options: BreakOptions = {}): Breaks {
  const { regressors = [], order = 0, criterion = "bic" } = options;
  const { response, design, times } = makeRows(values, regressors, order);
  const rows = response.length;
  const columns = 1 + order + regressors.length;
  const shortest = shortestSegment(options.minSegment ?? 0.15, rows, columns);
  const most = Math.min(options.maxBreaks ?? 5, Math.floor(rows / shortest) - 1);
  centreRows(response, design, columns);
  const sums = segmentSums(response, design, columns, shortest);
  const partitions = bestPartitions(sums, rows, shortest, most);
  const criteria = partitions.map(({ breaks, sumOfSquares }) => {
    const parameters = (columns + 1) * (breaks.length + 1);
    const likelihood = rows * (Math.log(2 * Math.PI) + 1 + Math.log(sumOfSquares / rows));
    // LWZ counts coefficients and dates, with c₀ = 0.299 and δ₀ = 0.1 as its authors chose them.
    const counted = parameters - 1;
    const penalty = (counted * 0.299 * Math.log(rows) ** 2.1) / rows;
    return {
      breaks: breaks.length,
      indexes: breaks.map((last) => times[last + 1]),
      sumOfSquares,
      bic: likelihood + Math.log(rows) * parameters,
      lwz: Math.log(sumOfSquares / (rows - counted)) + penalty,
    };
  });
  const chosen = criteria.reduce(
    (best, one, i) => (one[criterion] < criteria[best][criterion] ? i : best),
    0,
  );
  const ends = [-1, ...partitions[chosen].breaks, rows - 1];
  const fits = ends.slice(1).map((last, i) => segmentFit(response, design, columns, ends[i] + 1, last));
  const breaks = partitions[chosen].breaks.map((last, i) => {
    const { low, high } = dateRange(fits[i], fits[i + 1]);
    // Rows next to a gap are missing; beyond the ends rows continue as periods do.
    const timeOf = (row: number) =>
      row < 0 ? times[0] + row : row >= rows ? times[rows - 1] + row - rows + 1 : times[row];
    return { index: times[last + 1], low: timeOf(last + 1 + low), high: timeOf(last + 1 + high) };
  });
  const largest = supF(sums, rows, columns, shortest);
  const pValue = supFPValue(largest.statistic, columns, shortest / rows);
  return { breaks, criteria, supF: largest.statistic, pValue };
}

/** Rows [1, lags, regressors] whose values are all there, with the time of each. */
function makeRows(
  values: ArrayLike<number>,
  regressors: readonly ArrayLike<number>[],
  order: number,
): { response: Float64Array; design: Float64Array; times: number[] } {
  if (!Number.isInteger(order) || order < 0)
    throw new RangeError(`findBreaks needs order to be a whole number of at least 0, got ${order}`);
  for (const column of regressors)
    if (column.length !== values.length)
      throw new RangeError(`findBreaks needs regressors of length ${values.length}, got ${column.length}`);
  const response: number[] = [];
  const design: number[] = [];
  const times: number[] = [];
  for (let time = order; time < values.length; time++) {
    const row = [1];
    for (let lag = 1; lag <= order; lag++) row.push(values[time - lag]);
    for (const column of regressors) row.push(column[time]);
    if (Number.isNaN(values[time]) || row.some(Number.isNaN)) continue;
    response.push(values[time]);
    design.push(...row);
    times.push(time);
  }
  return { response: Float64Array.from(response), design: Float64Array.from(design), times };
}

/**
 * Takes the mean off the response and every column but the constant, in place. With the constant they span the same;
 * without, sums of squares of values far from zero would lose the digits that matter.
 */
function centreRows(response: Float64Array, design: Float64Array, columns: number): void {
  const takeOff = (array: Float64Array, start: number, step: number) => {
    let mean = 0;
    for (let at = start; at < array.length; at += step) mean += (array[at] * step) / array.length;
    for (let at = start; at < array.length; at += step) array[at] -= mean;
  };
  takeOff(response, 0, 1);
  for (let column = 1; column < columns; column++) takeOff(design, column, columns);
}

function shortestSegment(asked: number, rows: number, columns: number): number {
  const shortest = asked < 1 ? Math.floor(asked * rows) : Math.floor(asked);
  if (shortest <= columns || rows < 2 * shortest)
    throw new RangeError(
      `findBreaks needs segments of more than ${columns} rows and two of them: ${rows} rows in segments of at least ${shortest}`,
    );
  return shortest;
}

/** Offsets of a 95 % range around an estimated break, rounded outward (Bai 1997). */
function dateRange(before: SegmentFit, after: SegmentFit): { low: number; high: number } {
  const change = after.coefficients.map((value, i) => value - before.coefficients[i]);
  const left = before.momentAlong(change);
  const right = after.momentAlong(change);
  const moments = right / left;
  const variances = after.variance / before.variance;
  const unit = before.variance / left;
  return {
    low: -Math.ceil(argmaxQuantile(0.975, moments, variances) * unit),
    high: -Math.floor(argmaxQuantile(0.025, moments, variances) * unit),
  };
}
