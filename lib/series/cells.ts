import type { CombineRule } from "./reading.ts";

/** The observations of one series by key index, already combined where several rows share a key. */
export interface SeriesCells {
  readonly name: string;
  values: Float64Array;
  /** Rows behind each value; only kept once it matters. */
  counts: Uint32Array | undefined;
  /** When the value of the rule `last` was taken. */
  moments: Float64Array | undefined;
  /** Keys with several rows, where no rule was given. */
  repeats: Map<number, Repeat> | undefined;
  /** Some key had several rows. */
  hasSeveral: boolean;
  /** Highest key index in use plus one. */
  used: number;
}

export interface Repeat {
  count: number;
  sum: number;
  differs: boolean;
}

export const emptyCells = (name: string): SeriesCells => ({
  name,
  values: new Float64Array(0),
  counts: undefined,
  moments: undefined,
  repeats: undefined,
  hasSeveral: false,
  used: 0,
});

function grown(values: Float64Array, length: number): Float64Array {
  const larger = new Float64Array(length).fill(Number.NaN);
  larger.set(values);
  return larger;
}

function makeRoom(cells: SeriesCells, index: number, rule: CombineRule | undefined): void {
  if (index >= cells.values.length) {
    const length = Math.max(16, index + 1, Math.ceil(cells.values.length * 1.5));
    cells.values = grown(cells.values, length);
    if (rule === "last") cells.moments = grown(cells.moments ?? new Float64Array(0), length);
    if (rule === "mean") {
      const counts = new Uint32Array(length);
      if (cells.counts) counts.set(cells.counts);
      cells.counts = counts;
    }
  }
  if (index >= cells.used) cells.used = index + 1;
}

/** Adds one observation. `moment` orders the rows of one key for the rule `last`; equal moments go by row order. */
export function addValue(
  cells: SeriesCells,
  index: number,
  value: number,
  rule: CombineRule | undefined,
  moment: number,
): void {
  if (index >= cells.used) makeRoom(cells, index, rule);
  const { values } = cells;
  const before = values[index];
  const isFirst = Number.isNaN(before);
  if (!isFirst) cells.hasSeveral = true;
  switch (rule) {
    case undefined:
      if (isFirst) values[index] = value;
      else {
        cells.repeats ??= new Map();
        const repeat = cells.repeats.get(index);
        if (!repeat) cells.repeats.set(index, { count: 2, sum: before + value, differs: before !== value });
        else {
          repeat.count++;
          repeat.sum += value;
          if (before !== value) repeat.differs = true;
        }
      }
      return;
    case "sum":
      values[index] = isFirst ? value : before + value;
      return;
    case "mean":
      values[index] = isFirst ? value : before + value;
      if (cells.counts) cells.counts[index]++;
      return;
    case "max":
      if (isFirst || value > before) values[index] = value;
      return;
    case "count":
      values[index] = isFirst ? 1 : before + 1;
      return;
    case "last":
      if (cells.moments && (isFirst || moment >= cells.moments[index])) {
        values[index] = value;
        cells.moments[index] = moment;
      }
  }
}
