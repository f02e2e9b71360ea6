import { requireWhole } from "../autoregression/checks.ts";
import { logTransform } from "./leastSquaresTransform.ts";

// Exact distribution of the least-squares estimate of φ in a stationary Gaussian AR(1) of n values.

/** Steps of the trapezium rule in log t: integrands are analytic and vanish at both ends, so the error is tiny. */
const STEP = 0.1;

/** φ this close to 1 stands for the unit root. */
const NEAREST_ONE = 1 - 1e-8;

/**
 * P(φ̂ ≤ q), inverting the characteristic function of N − qD at zero (Gil-Pelaez 1951; Imhof 1961):
 * ½ − (1/π) ∫ Im E e^{it(N − qD)} dt/t.
 */
export function leastSquaresProbability(
  phi: number,
  n: number,
  q: number,
  mean: "zero" | "estimate",
): number {
  check("leastSquaresProbability", phi, n);
  const withMean = mean === "estimate";
  const turns = { argument: 0 };
  let sum = 0;
  // N and D are sums of about n terms of size 1/(1 − φ²).
  const smallest = Math.log(((1 - phi) * (1 + phi)) / n) - 30;
  for (let s = smallest; ; s += STEP) {
    const t = Math.exp(s);
    const transform = logTransform(phi, n, withMean, { re: 0, im: t }, { re: 0, im: -t * q }, turns);
    sum += Math.exp(transform.re) * Math.sin(transform.im);
    if (transform.re < -35) break;
  }
  return 0.5 - (STEP * sum) / Math.PI;
}

/**
 * E[φ̂], as ∫_0^∞ E[N e^{−tD}] dt (Sawa 1978); the bias is this minus φ.
 *
 * @example leastSquaresMean(0.8, 50, "estimate") // 0.734
 */
export function leastSquaresMean(phi: number, n: number, mean: "zero" | "estimate"): number {
  check("leastSquaresMean", phi, n);
  const withMean = mean === "estimate";
  let sum = 0;
  const smallest = Math.log(((1 - phi) * (1 + phi)) / n) - 30;
  for (let s = smallest; ; s += STEP) {
    const t = Math.exp(s);
    // The imaginary part of E e^{iεN − tD} over ε is E[N e^{−tD}] up to ε².
    const small = 1e-9 * Math.exp(smallest + 30);
    const transform = logTransform(
      phi,
      n,
      withMean,
      { re: 0, im: small },
      { re: -t, im: 0 },
      { argument: 0 },
    );
    sum += (t * Math.exp(transform.re) * Math.sin(transform.im)) / small;
    if (transform.re < -35) break;
  }
  return STEP * sum;
}

/**
 * Value that φ̂ (with an intercept) stays below with the given probability.
 *
 * @example leastSquaresQuantile(0.8, 50, 0.5) // the median
 */
export function leastSquaresQuantile(phi: number, n: number, probability: number): number {
  return bisect((q) => leastSquaresProbability(phi, n, q, "estimate") - probability, -2, 3);
}

/**
 * The φ whose φ̂ (least squares with an intercept) has its median at the estimate (Andrews 1993): as often too low as
 * too high. 1 when even a unit root has its median above the estimate or at it.
 *
 * @example medianUnbiased(0.8, 50) // 0.8622
 */
export function medianUnbiased(estimate: number, n: number): number {
  return coefficientAt(estimate, n, 0.5);
}

/**
 * Exact confidence interval of φ (Andrews 1993): under its low end an estimate this high or higher, under its high end
 * one this low or lower, has half of the remaining probability. `level` in percent. An end at 1 says that a unit root
 * is not ruled out.
 *
 * @example coefficientInterval(0.8, 50, 90) // { low: 0.69993, high: 1 }
 */
export function coefficientInterval(
  estimate: number,
  n: number,
  level: number,
): { readonly low: number; readonly high: number } {
  if (!(level > 0 && level < 100)) {
    throw new RangeError(`coefficientInterval needs a level between 0 and 100 percent, got ${level}`);
  }
  const tail = (100 - level) / 200;
  return { low: coefficientAt(estimate, n, 1 - tail), high: coefficientAt(estimate, n, tail) };
}

/** The φ under which an estimate this low or lower has the given probability, kept within −1..1. */
function coefficientAt(estimate: number, n: number, probability: number): number {
  const excess = (phi: number) => leastSquaresProbability(phi, n, estimate, "estimate") - probability;
  if (excess(NEAREST_ONE) >= 0) return 1;
  if (excess(-NEAREST_ONE) <= 0) return -1;
  return bisect((phi) => -excess(phi), -NEAREST_ONE, NEAREST_ONE);
}

/** Root of an increasing function by Ridders' (1979) rule. */
function bisect(f: (x: number) => number, low: number, high: number): number {
  let a = low;
  let b = high;
  let fa = f(a);
  let fb = f(b);
  for (let i = 0; i < 60 && b - a > 1e-10; i++) {
    const middle = 0.5 * (a + b);
    const fm = f(middle);
    const root = middle + ((middle - a) * Math.sign(fa - fb) * fm) / Math.sqrt(fm * fm - fa * fb);
    const fr = f(root);
    if (fr === 0) return root;
    const inner: [number, number][] =
      root < middle
        ? [
            [root, fr],
            [middle, fm],
          ]
        : [
            [middle, fm],
            [root, fr],
          ];
    for (const [x, fx] of inner) {
      if (fx < 0 && x > a) [a, fa] = [x, fx];
      else if (fx >= 0 && x < b) [b, fb] = [x, fx];
    }
  }
  return 0.5 * (a + b);
}

function check(operation: string, phi: number, n: number): void {
  if (!(Math.abs(phi) < 1)) throw new RangeError(`${operation} needs phi inside (-1, 1), got ${phi}`);
  requireWhole(operation, "n", n, 4);
}
