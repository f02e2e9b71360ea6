import { median } from "./median.ts";

/** Fewest values before a change that tell what the level was. */
const LEAST_BEFORE = 3;

/**
 * What is left of a series after its last lasting change. With enough values since (`enough`), only those; with fewer,
 * all of them, the earlier ones moved to the new level: the shape of the past (season, persistence) is kept, its level
 * is not.
 *
 * The step is the median change from one `season` to the next over the first season since the change, less the median
 * of the same before it: growth is taken to go on as it was, and not to be there when fewer than two seasons came
 * before. Later seasons are left out, for they are told apart from growth and wandering less well. Without a season
 * (0), or a whole one before the change, it is the difference of the medians of the values since and of as many before,
 * at least three.
 *
 * `changedAt` is the index of the first value after the change. Returns the input when there is no change inside.
 */
export function afterChange(
  values: Float64Array,
  changedAt: number | undefined,
  enough: number,
  season: number,
): Float64Array {
  if (changedAt === undefined || changedAt <= 0 || changedAt >= values.length) return values;
  const after = values.length - changedAt;
  if (after >= enough) return values.subarray(changedAt);
  const matched = season > 1 ? seasonalStep(values, changedAt, season) : Number.NaN;
  const step = Number.isNaN(matched)
    ? median(values.subarray(changedAt)) -
      median(values.subarray(Math.max(0, changedAt - Math.max(after, LEAST_BEFORE)), changedAt))
    : matched;
  if (!Number.isFinite(step)) return values;
  return values.map((value, t) => (t < changedAt ? value + step : value));
}

/** The step between equal places of the season; `NaN` where no such pair was observed. */
function seasonalStep(values: Float64Array, changedAt: number, season: number): number {
  const changes = values.map((value, t) => (t < season ? Number.NaN : value - values[t - season]));
  const growth = changedAt < 2 * season ? 0 : median(changes.subarray(0, changedAt));
  return median(changes.subarray(changedAt, changedAt + season)) - (Number.isNaN(growth) ? 0 : growth);
}
