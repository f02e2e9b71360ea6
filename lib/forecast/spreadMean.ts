import { type PredictiveSpread, spreadQuantile } from "./predictiveSpread.ts";

/** Gauss–Hermite nodes and weights for the standard normal, 9 points (Abramowitz and Stegun 25.4.46, scaled). */
const NODES = [
  -4.512745863399783, -3.20542900285647, -2.07684797867783, -1.0232556637891326, 0, 1.0232556637891326,
  2.07684797867783, 3.20542900285647, 4.512745863399783,
];
const WEIGHTS = [
  2.23458440077466e-5, 0.00278914132123177, 0.0499164067652178, 0.24409750289493953, 0.40634920634920635,
  0.24409750289493953, 0.0499164067652178, 0.00278914132123177, 2.23458440077466e-5,
];

/**
 * Mean of the predictive distribution at step `h` with the spread widened by `factor`: ∫ Q(factor·z) φ(z) dz by
 * Gauss–Hermite quadrature, exact for the raw and square-root scales and to seven digits for a logarithmic
 * deviation up to one, so the back-transform carries no bias.
 */
export function spreadMean(spread: PredictiveSpread, h: number, factor: number): number {
  let sum = 0;
  for (let i = 0; i < NODES.length; i++) sum += WEIGHTS[i] * spreadQuantile(spread, h, factor * NODES[i]);
  return sum;
}
