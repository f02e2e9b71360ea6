/** log Γ(x) for x > 0, by Lanczos' approximation (g = 607/128, Godfrey's 15 coefficients), to about 1e-15. */
export function logGamma(x: number): number {
  if (x < 0.5) return Math.log(Math.PI / Math.sin(Math.PI * x)) - logGamma(1 - x);
  let sum = LANCZOS[0];
  for (let i = 1; i < LANCZOS.length; i++) sum += LANCZOS[i] / (x - 1 + i);
  const t = x - 0.5 + 607 / 128;
  return 0.5 * Math.log(2 * Math.PI) + (x - 0.5) * Math.log(t) - t + Math.log(sum);
}

const LANCZOS = [
  0.9999999999999971, 57.15623566586292, -59.59796035547549, 14.136097974741746, -0.4919138160976202,
  0.00003399464998481189, 0.00004652362892704858, -0.00009837447530487956, 0.0001580887032249125,
  -0.00021026444172410488, 0.00021743961811521265, -0.0001643181065367639, 0.00008441822398385275,
  -0.000026190838401581408, 0.0000036899182659531625,
];

/**
 * Upper regularised incomplete gamma function Q(a, x) for a > 0, x ≥ 0: series below a + 1, Lentz's continued
 * fraction above (Press et al. 2007, section 6.2). Small tails keep their relative accuracy.
 */
export function upperGamma(a: number, x: number): number {
  if (!(x > 0)) return 1;
  if (x === Number.POSITIVE_INFINITY) return 0;
  const front = Math.exp(a * Math.log(x) - x - logGamma(a));
  if (x < a + 1) {
    let term = 1 / a;
    let sum = term;
    for (let k = 1; k < 10000 && term > sum * 1e-17; k++) {
      term *= x / (a + k);
      sum += term;
    }
    return 1 - front * sum;
  }
  let b = x + 1 - a;
  let c = 1e300;
  let d = 1 / b;
  let fraction = d;
  for (let k = 1; k < 10000; k++) {
    const numerator = -k * (k - a);
    b += 2;
    d = 1 / (numerator * d + b || 1e-300);
    c = b + numerator / c || 1e-300;
    const change = d * c;
    fraction *= change;
    if (Math.abs(change - 1) < 1e-16) break;
  }
  return front * fraction;
}

/** P(X > x) for a chi-square variable with `degreesOfFreedom` > 0. */
export function chiSquareTail(x: number, degreesOfFreedom: number): number {
  return upperGamma(degreesOfFreedom / 2, x / 2);
}

/** P(Z ≤ z) for a standard normal variable, accurate in both tails. */
export function normalProbability(z: number): number {
  const tail = 0.5 * upperGamma(0.5, (z * z) / 2);
  return z > 0 ? 1 - tail : tail;
}
