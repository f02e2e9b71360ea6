import { requireValues } from "./checks.ts";

/**
 * AR coefficients φ_1..φ_p from partial autocorrelations π_1..π_p (Durbin 1960; Barndorff-Nielsen & Schou 1973):
 * φ^(k)_k = π_k, φ^(k)_j = φ^(k−1)_j − π_k φ^(k−1)_{k−j}. Every point with all |π_k| < 1 is a stationary
 * process, and each stationary process has one.
 *
 * @example partialsToCoefficients([0.5, -0.3, 0.2]) // [0.71, -0.43, 0.2]
 */
export function partialsToCoefficients(partials: ArrayLike<number>): Float64Array {
  requireValues("partialsToCoefficients", "partials", partials, "no-gaps");
  const out = new Float64Array(partials.length);
  for (let k = 1; k <= out.length; k++) stepUp(out, k, partials[k - 1]);
  return out;
}

/** Turns coefficients of order k−1 into those of order k, in place. */
export function stepUp(coefficients: Float64Array, k: number, partial: number): void {
  for (let i = 0, j = k - 2; i <= j; i++, j--) {
    const low = coefficients[i];
    const high = coefficients[j];
    coefficients[i] = low - partial * high;
    if (i !== j) coefficients[j] = high - partial * low;
  }
  coefficients[k - 1] = partial;
}

/**
 * Partial autocorrelations π_1..π_p of a stationary AR process from φ_1..φ_p: the recursion of
 * `partialsToCoefficients` run backwards.
 *
 * Throws `RangeError` when the process is not stationary.
 *
 * @example coefficientsToPartials([0.71, -0.43, 0.2]) // [0.5, -0.3, 0.2]
 */
export function coefficientsToPartials(coefficients: ArrayLike<number>): Float64Array {
  requireValues("coefficientsToPartials", "coefficients", coefficients, "no-gaps");
  const partials = stepDown(coefficients);
  if (partials === undefined) {
    throw new RangeError(
      `coefficientsToPartials needs a stationary process, got coefficients [${Array.from(coefficients).join(", ")}]`,
    );
  }
  return partials;
}

/**
 * True when every root of z^p − φ_1 z^{p−1} − … − φ_p lies inside the unit circle, decided by the Schur–Cohn
 * recursion without finding roots: a root on the circle counts as not stationary.
 *
 * @example isStationary([1]) // false
 */
export function isStationary(coefficients: ArrayLike<number>): boolean {
  return stepDown(coefficients) !== undefined;
}

/** Partial autocorrelations, or `undefined` when one is not inside (−1, 1). */
export function stepDown(coefficients: ArrayLike<number>): Float64Array | undefined {
  const partials = Float64Array.from(coefficients);
  for (let k = partials.length; k >= 1; k--) {
    const partial = partials[k - 1];
    if (!(Math.abs(partial) < 1)) return undefined;
    const scale = 1 / ((1 - partial) * (1 + partial));
    for (let i = 0, j = k - 2; i <= j; i++, j--) {
      const low = partials[i];
      const high = partials[j];
      partials[i] = (low + partial * high) * scale;
      if (i !== j) partials[j] = (high + partial * low) * scale;
    }
  }
  return partials;
}
