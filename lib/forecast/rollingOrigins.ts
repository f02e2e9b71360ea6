/** A past point at which the forecast is made again. */
export interface Origin {
  /** Values known at the origin: 0..count−1. */
  readonly count: number;
  /** Steps ahead with a value to compare, at most the horizon. */
  readonly steps: number;
  /** Values the candidates are fitted to, at most `count`; neighbouring origins share a fit. */
  readonly fitted: number;
}

/** Origins at most, and fits among them: forecasting again is cheap, fitting again is not. */
const MOST_ORIGINS = 16;
const MOST_FITS = 4;

/**
 * Evenly spread origins over the later half of a series, newest first. The newest leaves as much of the horizon to
 * be checked as a series of this length can spare (an eighth of it, at most the horizon); none leaves fewer than
 * `least` values to fit. Half a horizon apart where there is room: closer ones repeat the same evidence, and
 * farther back is a past that says less of the present. Empty when the series is too short.
 */
export function rollingOrigins(count: number, horizon: number, least: number): Origin[] {
  const newest = count - Math.min(horizon, Math.max(1, Math.floor(count / 8)));
  const oldest = Math.max(least, Math.ceil(count / 2));
  if (newest < oldest) return [];
  const room = (newest - oldest) / (MOST_ORIGINS - 1);
  const spacing = Math.max(1, Math.floor(Math.min(room, horizon / 2)));
  const number = Math.min(MOST_ORIGINS, Math.floor((newest - oldest) / spacing) + 1);
  const sharing = Math.ceil(number / MOST_FITS);
  const at = (i: number): number => newest - i * spacing;
  return Array.from({ length: number }, (_, i) => {
    const lastOfGroup = Math.min(number - 1, i - (i % sharing) + sharing - 1);
    return { count: at(i), steps: Math.min(horizon, count - at(i)), fitted: at(lastOfGroup) };
  });
}

/**
 * How many whole horizons the outcomes of the origins (newest first) cover together, each value counted once: the
 * independent evidence they hold. A series with less than one horizon of outcomes has one of as many as there are.
 */
export function horizonsCovered(origins: readonly Origin[]): number {
  let covered = 0;
  let longest = 1;
  let reached = Number.POSITIVE_INFINITY;
  for (const { count, steps } of origins) {
    covered += Math.max(0, Math.min(count + steps, reached) - count);
    longest = Math.max(longest, steps);
    reached = count;
  }
  return covered / longest;
}

/** Whether two origins are judged by some of the same outcomes. */
export function shareOutcomes(a: Origin, b: Origin): boolean {
  return a.count < b.count + b.steps && b.count < a.count + a.steps;
}
