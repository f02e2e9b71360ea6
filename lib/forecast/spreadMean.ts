import { tabulate } from "../numeric/tabulate.ts";
import { type PredictiveSpread, spreadQuantile } from "./predictiveSpread.ts";

/** Steps of an eighth, to where the normal density is nothing beside its middle. */
const STEP = 1 / 8;
const NODES = tabulate(129, (i) => (i - 64) * STEP);
const DENSITIES = NODES.map((z) => Math.exp(-(z * z) / 2));
const TOTAL = DENSITIES.reduce((sum, density) => sum + density, 0);

/**
 * Mean of the predictive distribution at step `h` with the spread widened by `factor`: ∫ Q(factor·z) φ(z) dz by the
 * trapezoid rule, which is exact to rounding where Q is smooth. On the logarithm Q bends at a doubling and on the square
 * root at zero (its second derivative jumps), which leaves errors of some 1e-5 of the mean.
 */
export function spreadMean(spread: PredictiveSpread, h: number, factor: number): number {
  let sum = 0;
  for (let i = 0; i < NODES.length; i++) sum += DENSITIES[i] * spreadQuantile(spread, h, factor * NODES[i]);
  return sum / TOTAL;
}
