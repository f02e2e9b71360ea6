import type { EventColumn } from "../series/eventColumns.ts";

/** What is left of a column below this share of it is rounding: it says nothing that the others do not. */
const leastShare = 1e-6;

/** Two events with one effect; in the coming periods either brings it. */
const joined = (one: EventColumn, other: EventColumn): EventColumn => ({
  ...one,
  name: `${one.name} and ${other.name}`,
  values: one.values.map((value, time) => Math.max(value, other.values[time])),
});

/**
 * Events whose effects can be told apart. Those that always fall in the same periods (Good Friday and Easter Sunday, by
 * the week) become one, named after all of them; one that the regression `terms` and the events before it make up between
 * them is left out. Only periods with a value count; `values` has `NaN` for the others.
 */
export function distinctEvents(
  columns: readonly EventColumn[],
  terms: readonly Float64Array[],
  values: Float64Array,
): EventColumn[] {
  const seen = Array.from(values.keys()).filter((time) => !Number.isNaN(values[time]));
  const together = new Map<string, EventColumn>();
  for (const column of columns) {
    const key = seen.map((time) => column.values[time]).join();
    const same = together.get(key);
    together.set(key, same ? joined(same, column) : column);
  }
  const directions: number[][] = [];
  /** Takes the earlier directions off a column; adds what is left as a direction, if anything is. */
  const isNew = (column: ArrayLike<number>): boolean => {
    const rest = seen.map((time) => column[time]);
    const size = Math.hypot(...rest);
    for (const direction of directions) {
      const along = direction.reduce((sum, value, row) => sum + value * rest[row], 0);
      for (let row = 0; row < rest.length; row++) rest[row] -= along * direction[row];
    }
    const left = Math.hypot(...rest);
    if (!(left > leastShare * size)) return false;
    directions.push(rest.map((value) => value / left));
    return true;
  };
  for (const term of terms) isNew(term);
  return [...together.values()].filter((column) => isNew(column.values));
}
