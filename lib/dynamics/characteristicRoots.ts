import { requireValues } from "../autoregression/checks.ts";
import { polynomialRoots } from "../numeric/polynomialRoots.ts";

export interface CharacteristicRoot {
  readonly modulus: number;
  /** 2π/|argument|: the cycle in periods; infinite for a positive real root, 2 for a negative one. */
  readonly period: number;
}

/**
 * Imaginary parts smaller than this share of the modulus are taken for rounding of a repeated real root (three equal
 * roots come out about 1e-5 apart); a true cycle that slow would be longer than 60,000 periods.
 */
const REAL = 1e-4;

/**
 * Eigenvalues of the companion matrix, that is the roots of z^p − φ_1 z^{p−1} − … − φ_p, largest modulus first;
 * both of a complex pair are listed. The process is stationary exactly when every modulus is below one (decide
 * close cases with `isStationary`, which has no rounding of a root finder).
 *
 * @example characteristicRoots([1, -0.5]) // twice { modulus: 0.7071, period: 8 }
 */
export function characteristicRoots(coefficients: ArrayLike<number>): CharacteristicRoot[] {
  requireValues("characteristicRoots", "coefficients", coefficients, "no-gaps");
  return polynomialRoots(Array.from(coefficients, (value) => -value))
    .map(({ re, im }) => {
      const modulus = Math.hypot(re, im);
      if (Math.abs(im) > REAL * modulus) {
        return { modulus, period: (2 * Math.PI) / Math.abs(Math.atan2(im, re)) };
      }
      return { modulus, period: re < 0 ? 2 : Number.POSITIVE_INFINITY };
    })
    .sort((a, b) => b.modulus - a.modulus || b.period - a.period);
}

/** A damped cycle. */
export interface Rhythm {
  /** Length in periods. */
  readonly period: number;
  /** Factor by which the swing shrinks each period. */
  readonly damping: number;
}

/**
 * The rhythm of the slowest-fading complex pair of roots; `undefined` when all roots are real. It is the cycle of
 * the autocorrelations, near but not equal to the peak of the spectrum.
 *
 * @example rhythm([1.34254, -0.65504]) // period 10.60, damping 0.8093: Yule's (1927) sunspots
 */
export function rhythm(coefficients: ArrayLike<number>): Rhythm | undefined {
  const pair = characteristicRoots(coefficients).find(
    ({ period }) => period !== 2 && Number.isFinite(period),
  );
  return pair && { period: pair.period, damping: pair.modulus };
}
