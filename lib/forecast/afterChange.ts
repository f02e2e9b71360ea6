import { median } from "./median.ts";

/**
 * What is left of a series after its last lasting change. With enough values since (`enough`), only those; with fewer,
 * all of them, the earlier ones moved to the new level: the shape of the past (season, persistence) is kept, its level
 * is not. The step is the difference of the medians of up to as many values before the change as stand after it.
 *
 * `changedAt` is the index of the first value after the change. Returns the input when there is no change inside.
 */
export function afterChange(
  values: Float64Array,
  changedAt: number | undefined,
  enough: number,
): Float64Array {
  if (changedAt === undefined || changedAt <= 0 || changedAt >= values.length) return values;
  const after = values.length - changedAt;
  if (after >= enough) return values.subarray(changedAt);
  const step =
    median(values.subarray(changedAt)) -
    median(values.subarray(Math.max(0, changedAt - Math.max(after, 3)), changedAt));
  if (!Number.isFinite(step)) return values;
  return values.map((value, t) => (t < changedAt ? value + step : value));
}
