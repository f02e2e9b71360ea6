import type { ModelFacts } from "./facts.ts";

/**
 * Whether the describing model has a part in the forecast, its share rounding to one percent at least. Without one it
 * still describes how shocks fade, but nothing may be said from it of what the forecast holds.
 */
export const takesPart = ({ weight }: ModelFacts) => weight >= 0.005;
