/** One line of the bench table. */
export interface BenchRow {
  /** What was measured. */
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  /** What it was measured against, in the same run; empty when against nothing. */
  readonly against: string;
  /** How many times better than that (or the plain ratio the goal speaks of); `NaN` when against nothing. */
  readonly ratio: number;
  /** The goal in words, for example "at least 30 times faster"; empty without one. */
  readonly goal: string;
}

/** A row; a figure by itself unless `rest` says against what. */
export const benchRow = (
  name: string,
  value: number,
  unit: string,
  rest: Partial<BenchRow> = {},
): BenchRow => ({ name, value, unit, against: "", ratio: Number.NaN, goal: "", ...rest });
