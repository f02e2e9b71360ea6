/** Past points at which the forecast is made again, and how far each can be checked. */
export interface Origin {
  /** Values known at the origin: 0..count−1. */
  readonly count: number;
  /** Steps ahead with a value to compare, at most the horizon. */
  readonly steps: number;
}

/** Origins tried at most: enough to tell candidates apart, few enough to refit every one. */
const MOST_ORIGINS = 8;

/**
 * Evenly spread origins over the later half of a series, newest first. The newest leaves as much of the horizon to
 * be checked as a series of this length can spare (an eighth of it, at most the horizon); none leaves fewer than
 * `least` values to fit. Empty when the series is too short.
 */
export function rollingOrigins(count: number, horizon: number, least: number): Origin[] {
  const newest = count - Math.min(horizon, Math.max(1, Math.floor(count / 8)));
  const oldest = Math.max(least, Math.ceil(count / 2));
  if (newest < oldest) return [];
  const origins: Origin[] = [];
  const number = Math.min(MOST_ORIGINS, newest - oldest + 1);
  // A quarter of the horizon apart where there is room: closer origins repeat the same evidence.
  const room = number > 1 ? (newest - oldest) / (number - 1) : 0;
  const spacing = Math.max(1, Math.floor(Math.min(room, Math.max(1, horizon / 2))));
  for (let i = 0; i < number; i++) {
    const at = newest - i * spacing;
    if (at < oldest) break;
    origins.push({ count: at, steps: Math.min(horizon, count - at) });
  }
  return origins;
}

/** How many whole horizons, laid end to end, the origins look back over: the independent evidence they hold. */
export function horizonsCovered(origins: readonly Origin[], count: number): number {
  if (origins.length === 0) return 0;
  const longest = origins.reduce((most, { steps }) => Math.max(most, steps), 1);
  return (count - origins[origins.length - 1].count) / longest;
}
