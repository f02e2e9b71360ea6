import { median } from "./median.ts";

/** Fewest values before a change that tell what the level was. */
const LEAST_BEFORE = 3;

/**
 * What is left of a series after its last lasting change. With enough values since (`enough`), only those; with fewer,
 * all of them, the earlier ones moved to the new level: the shape of the past (season, persistence) is kept, its level
 * is not.
 *
 * The step is the difference of the medians of the values since and of as many before, at least three. Where values a
 * `season` apart have been nearer to each other, growth aside, than values in different places of it, it is the median
 * change from one season to the next over the first season since, less the median of the same before the change:
 * growth is taken to go on as it was, and not to be there when fewer than two seasons came before. Later seasons are
 * left out, for what grows and wanders takes them ever farther from the step.
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

/** The step between equal places of the season; `NaN` where no such pair was observed, or nearer values tell more. */
function seasonalStep(values: Float64Array, changedAt: number, season: number): number {
  const changes = (lag: number) => values.map((value, t) => (t < lag ? Number.NaN : value - values[t - lag]));
  const overSeason = changes(season);
  const before = overSeason.subarray(0, changedAt);
  const usual = changedAt < 2 * season ? 0 : median(before);
  const growth = Number.isNaN(usual) ? 0 : usual;
  const near = changes(Math.min(values.length - changedAt, Math.floor(season / 2))).subarray(0, changedAt);
  if (median(before.map((change) => Math.abs(change - growth))) > median(near.map(Math.abs)))
    return Number.NaN;
  return median(overSeason.subarray(changedAt, changedAt + season)) - growth;
}
