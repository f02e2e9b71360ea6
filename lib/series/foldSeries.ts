import type { Calendar } from "./calendar.ts";
import type { SeriesCells } from "./cells.ts";
import { type Grid, startOf } from "./grid.ts";
import type { CombineRule } from "./reading.ts";
import type { Series } from "./series.ts";

/** Calls `use` for every observation of a series in a period that is over, by date. */
function eachValue(
  cells: SeriesCells,
  grid: Grid,
  use: (ordinal: number, value: number, index: number) => void,
): void {
  const { order, ordinals, complete } = grid;
  const { values, used } = cells;
  for (let at = 0; at < complete; at++) {
    const index = order[at];
    if (index >= used) continue;
    const value = values[index];
    if (!Number.isNaN(value)) use(ordinals[at], value, index);
  }
}

/** How many periods of a series have a value, and how many have several rows. */
export function countRepeats(cells: SeriesCells, grid: Grid): { periods: number; several: number } {
  let periods = 0;
  let several = 0;
  let previous = Number.NaN;
  let counted = false;
  eachValue(cells, grid, (ordinal, _value, index) => {
    const isNew = ordinal !== previous;
    if (isNew) {
      periods++;
      counted = false;
      previous = ordinal;
    }
    if (!counted && (!isNew || cells.repeats?.has(index))) {
      several++;
      counted = true;
    }
  });
  return { periods, several };
}

export interface Folded {
  readonly series: Series;
  /** Ordinals of periods with several values that differ, where no rule was given; they are gaps. */
  readonly conflicts: ReadonlySet<number>;
}

/**
 * Lays one series on its grid, from its first to its last value; several values of a period become one by the rule.
 * Without a rule equal values count once, and values that differ leave a gap. `undefined` for a series without values.
 */
export function foldSeries(
  cells: SeriesCells,
  grid: Grid,
  calendar: Calendar,
  rule: CombineRule | undefined,
  emptyMeans: "gap" | "zero",
): Folded | undefined {
  let first = Number.NaN;
  let last = Number.NaN;
  eachValue(cells, grid, (ordinal) => {
    if (Number.isNaN(first)) first = ordinal;
    last = ordinal;
  });
  if (Number.isNaN(first)) return undefined;
  const values = new Float64Array(last - first + 1).fill(Number.NaN);
  const counts = rule === "mean" ? new Uint32Array(values.length) : undefined;
  const conflicts = new Set<number>();
  eachValue(cells, grid, (ordinal, value, index) => {
    const slot = ordinal - first;
    const before = values[slot];
    const isFirst = Number.isNaN(before);
    const repeat = cells.repeats?.get(index);
    switch (rule) {
      case undefined:
        if (repeat?.differs || (!isFirst && before !== value)) conflicts.add(ordinal);
        if (isFirst) values[slot] = value;
        break;
      case "sum":
      case "count": {
        const amount = repeat?.sum ?? value;
        values[slot] = isFirst ? amount : before + amount;
        break;
      }
      case "mean":
        values[slot] = isFirst ? value : before + value;
        if (counts) counts[slot] += cells.counts?.[index] ?? 1;
        break;
      case "max":
        values[slot] = isFirst ? value : Math.max(before, value);
        break;
      case "last":
        values[slot] = value;
    }
  });
  for (const ordinal of conflicts) values[ordinal - first] = Number.NaN;
  let observed = 0;
  for (let slot = 0; slot < values.length; slot++) {
    if (counts && counts[slot] > 0) values[slot] /= counts[slot];
    if (emptyMeans === "zero" && Number.isNaN(values[slot]) && !conflicts.has(first + slot)) values[slot] = 0;
    if (!Number.isNaN(values[slot])) observed++;
  }
  const series = {
    name: cells.name,
    period: calendar.every,
    start: startOf(calendar, first),
    values,
    observed,
    gaps: values.length - observed,
  };
  return { series, conflicts };
}
