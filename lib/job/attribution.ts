import type { AutoregressiveProcess } from "../autoregression/fit.ts";
import { shockContributions } from "../dynamics/shockContributions.ts";
import type { AttributionFacts } from "../words/facts.ts";

/** Shocks further back than this are not told apart; in a model that fades their effect is small. */
const shocksLookedAt = 26;
const shocksTold = 6;

/**
 * Which past shocks still carry the coming periods, the most influential first, as they fade by the process `followed`.
 * `departures` are the values less the describing model's terms, on its scale.
 */
export function attributionFacts(
  followed: AutoregressiveProcess,
  departures: Float64Array,
  horizon: number,
  longRunLevel: number,
  periodOf: (index: number) => string,
): AttributionFacts | null {
  if (followed.coefficients.length === 0) return null;
  const process = { ...followed, mean: 0 };
  const { shocks } = shockContributions(process, departures, { horizon, last: shocksLookedAt });
  const influence = (effects: Float64Array) => effects.reduce((sum, effect) => sum + Math.abs(effect), 0);
  const told = [...shocks].sort((a, b) => influence(b.effects) - influence(a.effects)).slice(0, shocksTold);
  return {
    longRunLevel,
    shocks: told.map(({ index, shock, effects }) => ({
      period: periodOf(index),
      shock,
      effects: Array.from(effects),
    })),
  };
}
