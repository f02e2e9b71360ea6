import fc from "fast-check";
import { partialsToCoefficients } from "../../lib/autoregression/partials.ts";
import { randomNormal } from "../../lib/numeric/randomNormal.ts";

/** Coefficients of stationary processes of order 1 to `maxOrder`, drawn by their partial autocorrelations. */
export function stationaryCoefficients(maxOrder = 5, largest = 0.9): fc.Arbitrary<Float64Array> {
  const partial = fc.double({ min: -largest, max: largest, noNaN: true });
  return fc.array(partial, { minLength: 1, maxLength: maxOrder }).map(partialsToCoefficients);
}

/** A series of the process with unit innovations, after a warm-up of 200 values. */
export function simulate(coefficients: ArrayLike<number>, length: number, seed: number): Float64Array {
  const normal = randomNormal(seed);
  const all = new Float64Array(length + 200);
  for (let t = 0; t < all.length; t++) {
    all[t] = normal();
    for (let j = 1; j <= Math.min(t, coefficients.length); j++) all[t] += coefficients[j - 1] * all[t - j];
  }
  return all.slice(200);
}

/** A copy with gaps at the given places. */
export function withGaps(values: ArrayLike<number>, places: readonly number[]): Float64Array {
  const copy = Float64Array.from(values);
  for (const place of places) copy[place] = Number.NaN;
  return copy;
}
