import { cumulativeNormal } from "./normalLaw.ts";

/**
 * Distribution function of the argmax of V(s): a two-sided Brownian motion with drift, W₁(−s) − |s|/2 left of
 * zero and φ·W₂(s) − ξ s/2 right of it (Bai 1997, appendix B, with φ here the ratio of variances). It is the law
 * of the estimated break date around the true one.
 *
 * @example argmaxCdf(1, 1, 1) // 0.69885
 */
export function argmaxCdf(x: number, ratioOfMoments: number, ratioOfVariances: number): number {
  const xi = ratioOfMoments;
  const phi = ratioOfMoments * ratioOfVariances;
  const s = Math.abs(x);
  if (x < 0) {
    const ratio = xi / phi;
    const both = phi + 2 * xi;
    return (
      -Math.sqrt(s / (2 * Math.PI)) * Math.exp(-s / 8) -
      ((phi / xi) * both * scaledTail((ratio * (1 + ratio) * s) / 2, (0.5 + ratio) * Math.sqrt(s))) /
        (phi + xi) +
      (s / 2 - 2 + both ** 2 / ((phi + xi) * xi)) * cumulativeNormal(-Math.sqrt(s) / 2)
    );
  }
  const ratio = xi ** 2 / phi;
  const both = 2 * phi + xi;
  return (
    1 +
    Math.sqrt((ratio * s) / (2 * Math.PI)) * Math.exp((-ratio * s) / 8) +
    ((xi / phi) * both * scaledTail(((phi + xi) * s) / 2, ((phi + xi / 2) / Math.sqrt(phi)) * Math.sqrt(s))) /
      (phi + xi) -
    (both ** 2 / ((phi + xi) * phi) - 2 + (ratio * s) / 2) * cumulativeNormal(-Math.sqrt(ratio * s) / 2)
  );
}

/** e^a Φ(−z) without overflow: for large z by Φ(−z) ≈ φ(z)/z·(1 − 1/z² + 3/z⁴ − 15/z⁶). */
function scaledTail(a: number, z: number): number {
  if (z < 12) return Math.exp(a) * cumulativeNormal(-z);
  const inverse = 1 / (z * z);
  const series = 1 - inverse + 3 * inverse ** 2 - 15 * inverse ** 3;
  return (Math.exp(a - (z * z) / 2) / (z * Math.sqrt(2 * Math.PI))) * series;
}

/** The `probability` quantile of argmaxCdf, by bisection. */
export function argmaxQuantile(
  probability: number,
  ratioOfMoments: number,
  ratioOfVariances: number,
): number {
  const cdf = (x: number) => argmaxCdf(x, ratioOfMoments, ratioOfVariances);
  let low = -1;
  let high = 1;
  while (cdf(low) > probability) low *= 2;
  while (cdf(high) < probability) high *= 2;
  for (let step = 0; step < 100; step++) {
    const middle = (low + high) / 2;
    if (cdf(middle) < probability) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
