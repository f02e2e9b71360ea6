/** A complex number as a pair that is overwritten. */
export interface Complex {
  re: number;
  im: number;
}

/**
 * log E exp(a·N + b·D) for the least-squares estimate φ̂ = N/D of a stationary Gaussian AR(1), N = Σ x_t x_{t−1} and
 * D = Σ x_{t−1}² over t = 2..n, both about the means of their own terms when `withMean`.
 *
 * It is −½ log[det(V⁻¹ − 2(aA + bB))/det V⁻¹] with V⁻¹ and the uncentred A, B tridiagonal, so the elimination takes one
 * pass of O(n); the centring adds a term of rank two. `turns` carries the argument of that term's determinant from one
 * call to the next, for a caller that moves along a path from a = b = 0 in small steps.
 */
export function logTransform(
  phi: number,
  n: number,
  withMean: boolean,
  a: Complex,
  b: Complex,
  turns: { argument: number },
): Complex {
  const offRe = -phi - a.re;
  const offIm = -a.im;
  const squareRe = offRe * offRe - offIm * offIm;
  const squareIm = 2 * offRe * offIm;
  let logSize = 0;
  let argument = 0;
  // Pivot, then forward solutions for e = (0,1,…,1) and f = (1,…,1,0).
  let dRe = 1 - 2 * b.re;
  let dIm = -2 * b.im;
  let eRe = 0;
  let eIm = 0;
  let fRe = 1;
  let fIm = 0;
  const sums = { eeRe: 0, eeIm: 0, efRe: 0, efIm: 0, ffRe: 0, ffIm: 0 };
  for (let i = 1; ; i++) {
    const size = dRe * dRe + dIm * dIm;
    logSize += 0.5 * Math.log(size);
    argument += Math.atan2(dIm, dRe);
    const inverseRe = dRe / size;
    const inverseIm = -dIm / size;
    if (withMean) addSolutions(sums, eRe, eIm, fRe, fIm, inverseRe, inverseIm);
    if (i === n) break;
    const last = i === n - 1;
    const ratioRe = offRe * inverseRe - offIm * inverseIm;
    const ratioIm = offRe * inverseIm + offIm * inverseRe;
    const nextERe = 1 - (ratioRe * eRe - ratioIm * eIm);
    eIm = -(ratioRe * eIm + ratioIm * eRe);
    eRe = nextERe;
    const nextFRe = (last ? 0 : 1) - (ratioRe * fRe - ratioIm * fIm);
    fIm = -(ratioRe * fIm + ratioIm * fRe);
    fRe = nextFRe;
    dRe = (last ? 1 : 1 + phi * phi - 2 * b.re) - (squareRe * inverseRe - squareIm * inverseIm);
    dIm = (last ? 0 : -2 * b.im) - (squareRe * inverseIm + squareIm * inverseRe);
  }
  if (withMean) {
    const centring = centringDeterminant(sums, a, b, n - 1);
    logSize += 0.5 * Math.log(centring.re * centring.re + centring.im * centring.im);
    const principal = Math.atan2(centring.im, centring.re);
    const whole = 2 * Math.PI;
    turns.argument = principal + whole * Math.round((turns.argument - principal) / whole);
    argument += turns.argument;
  }
  const logDetInverse = Math.log((1 - phi) * (1 + phi));
  return { re: 0.5 * (logDetInverse - logSize), im: -0.5 * argument };
}

type Sums = { eeRe: number; eeIm: number; efRe: number; efIm: number; ffRe: number; ffIm: number };

function addSolutions(
  sums: Sums,
  eRe: number,
  eIm: number,
  fRe: number,
  fIm: number,
  inverseRe: number,
  inverseIm: number,
): void {
  const scaledERe = eRe * inverseRe - eIm * inverseIm;
  const scaledEIm = eRe * inverseIm + eIm * inverseRe;
  sums.eeRe += eRe * scaledERe - eIm * scaledEIm;
  sums.eeIm += eRe * scaledEIm + eIm * scaledERe;
  sums.efRe += fRe * scaledERe - fIm * scaledEIm;
  sums.efIm += fRe * scaledEIm + fIm * scaledERe;
  const scaledFRe = fRe * inverseRe - fIm * inverseIm;
  const scaledFIm = fRe * inverseIm + fIm * inverseRe;
  sums.ffRe += fRe * scaledFRe - fIm * scaledFIm;
  sums.ffIm += fRe * scaledFIm + fIm * scaledFRe;
}

/** det(I + G UᵀK⁻¹U) for U = [e f], G = [[0, a], [a, 2b]]/rows. */
function centringDeterminant(s: Sums, a: Complex, b: Complex, rows: number): Complex {
  const ee = { re: s.eeRe, im: s.eeIm };
  const ef = { re: s.efRe, im: s.efIm };
  const ff = { re: s.ffRe, im: s.ffIm };
  const twoB = { re: 2 * b.re, im: 2 * b.im };
  const m11 = product(a, ef);
  const m12 = product(a, ff);
  const m21 = sum(product(a, ee), product(twoB, ef));
  const m22 = sum(product(a, ef), product(twoB, ff));
  const one = (m: Complex) => ({ re: 1 + m.re / rows, im: m.im / rows });
  const diagonal = product(one(m11), one(m22));
  const cross = product(m12, m21);
  return { re: diagonal.re - cross.re / rows ** 2, im: diagonal.im - cross.im / rows ** 2 };
}

function product(x: Complex, y: Complex): Complex {
  return { re: x.re * y.re - x.im * y.im, im: x.re * y.im + x.im * y.re };
}

function sum(x: Complex, y: Complex): Complex {
  return { re: x.re + y.re, im: x.im + y.im };
}
