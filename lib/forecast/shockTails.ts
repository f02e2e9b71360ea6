import type { MemberFit } from "./memberFit.ts";

/** Quantiles of shock sizes at 80 and 95 % over those of a normal law of the same mean square. */
export interface ShockTails {
  readonly narrow: number;
  readonly wide: number;
}

export const NORMAL_TAILS: ShockTails = { narrow: 1, wide: 1 };

/** Normal quantiles of the central 80 and 95 % ranges. */
export const NARROW = 1.2815515655446004;
export const WIDE = 1.959963984540054;
/** Fewer shocks have no quantile to speak of. */
const FEWEST = 6;

/**
 * How the shocks of a series are spread beside a normal law: where a few large ones make most of the mean square, the
 * usual ones are smaller than it says, and a range of so many deviations too wide. Never above one: lighter tails than
 * the normal are chance in a short series. Both are in order (narrow ≤ wide).
 */
export function shockTails(shocks: Float64Array): ShockTails {
  const count = shocks.length;
  let power = 0;
  for (let t = 0; t < count; t++) power += shocks[t] * shocks[t];
  const deviation = Math.sqrt(power / count);
  if (count < FEWEST || !(deviation > 0)) return NORMAL_TAILS;
  const sizes = shocks.map(Math.abs).sort();
  const beside = (probability: number, normal: number): number =>
    Math.min(1, sizes[Math.floor(probability * count)] / (normal * deviation));
  const narrow = Math.max(SMALLEST, beside(0.8, NARROW));
  return { narrow, wide: Math.max(narrow, beside(0.95, WIDE)) };
}

/** A series still but for a few jumps has no usual shock; it is not believed to be without any. */
const SMALLEST = 0.05;

/** One-step errors of a fit on its own values, from where every lag is known or half of the values are. */
export function memberShocks({
  stages,
  model,
  preparation,
  meanProfile,
  wholeMean,
  count,
}: MemberFit): Float64Array {
  const series = stages[stages.length - 1];
  const offset = stages[0].length - series.length;
  const length = count - offset;
  const { coefficients } = model;
  const centred = new Float64Array(length);
  for (let t = 0; t < length; t++) {
    const profile = meanProfile === undefined ? 0 : meanProfile[(t + offset) % preparation.season];
    centred[t] = series[t] - wholeMean - profile;
  }
  const from = Math.min(coefficients.length, length >> 1);
  const shocks = new Float64Array(length - from);
  for (let t = from; t < length; t++) {
    let error = centred[t];
    const reach = Math.min(coefficients.length, t);
    for (let j = 0; j < reach; j++) error -= coefficients[j] * centred[t - 1 - j];
    shocks[t - from] = error;
  }
  return shocks;
}
