import type { Bounds, LimitChance } from "./forecast.ts";

/** Clamps into bounds. */
export function within(value: number, bounds: Bounds | undefined): number {
  return Math.min(
    bounds?.high ?? Number.POSITIVE_INFINITY,
    Math.max(bounds?.low ?? Number.NEGATIVE_INFINITY, value),
  );
}

/** Bounds of the sum of so many values that keep `bounds`. */
export function boundsOfSum(bounds: Bounds | undefined, count: number): Bounds {
  const times = (bound: number | undefined) =>
    bound === undefined || !Number.isFinite(bound) ? bound : bound * count;
  return { low: times(bounds?.low), high: times(bounds?.high) };
}

/**
 * Range of the sum of the steps in one range a step: around the `sum` told, within the bounds, and no nearer than any
 * step alone reaches while all others are at their bound.
 */
export function aroundSum(
  sum: number,
  ends: { readonly low: number; readonly high: number },
  steps: { readonly low: Float64Array; readonly high: Float64Array },
  bounds: Bounds,
): { low: number; high: number } {
  const others = boundsOfSum(bounds, steps.low.length - 1);
  const alone = {
    low: Math.min(...steps.low) + (others.high ?? Number.POSITIVE_INFINITY),
    high: Math.max(...steps.high) + (others.low ?? Number.NEGATIVE_INFINITY),
  };
  const sumBounds = boundsOfSum(bounds, steps.low.length);
  return {
    low: Math.min(sum, within(Math.min(ends.low, alone.low), sumBounds)),
    high: Math.max(sum, within(Math.max(ends.high, alone.high), sumBounds)),
  };
}

/** Exact zeros from which a series that never went below them is taken to end there. */
const ZEROS_OF_A_FLOOR = 5;

/**
 * Bounds that coming values keep: those stated, and zero from below where values were zero several times and never
 * less, as counts and amounts are.
 */
export function boundsOf(observed: Float64Array, stated: Bounds = {}): Bounds {
  if (stated.low !== undefined || (stated.high ?? 0) < 0) return stated;
  let zeros = 0;
  for (const value of observed) {
    if (value < 0) return stated;
    if (value === 0) zeros++;
  }
  return zeros >= ZEROS_OF_A_FLOOR ? { ...stated, low: 0 } : stated;
}

/** Chances of passing limits: none where a bound lies between. */
export function chancesWithin(chances: readonly LimitChance[], bounds: Bounds): LimitChance[] {
  return chances.map((chance) => {
    const shut =
      chance.direction === "above"
        ? chance.limit >= (bounds.high ?? Number.POSITIVE_INFINITY)
        : chance.limit <= (bounds.low ?? Number.NEGATIVE_INFINITY);
    return shut ? { ...chance, each: chance.each.map(() => 0), any: 0 } : chance;
  });
}
