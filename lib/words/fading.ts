import type { ModelFacts } from "./facts.ts";

/** What is said of how shocks fade, and whether a half-life may be told with it. */
export interface ToldFading {
  /** `swings`: no shift lasts, but the swings that follow a shock have no end that the data tell. */
  readonly verdict: ModelFacts["fading"] | "swings";
  readonly hasHalfLife: boolean;
}

/**
 * The one statement about fading that sentences, tiles and pictures make of a model. A half-life is told only where the
 * data can tell one: not where they leave fading itself open, nor where its range has no bound at either end. Where
 * shocks are said to fade all the same, the tests speak of the level alone, about which a shock may go on swinging.
 */
export function toldFading({ fading, halfLife, halfLifeRange: { low, high } }: ModelFacts): ToldFading {
  const bounded = low !== null && (low > 0 || high !== null);
  if (fading === "cannot-tell") return { verdict: fading, hasHalfLife: false };
  if (fading === "fades" && (!bounded || halfLife === null)) return { verdict: "swings", hasHalfLife: false };
  return { verdict: fading, hasHalfLife: bounded };
}
