/**
 * Φ(x) to full relative precision in the lower tail too: the complementary error function by its series for
 * small |x| and by its continued fraction (Lentz's method) beyond.
 */
export function cumulativeNormal(x: number): number {
  const z = Math.abs(x) / Math.SQRT2;
  const upper = z < 2 ? 1 - erfSeries(z) : erfcFraction(z);
  return x > 0 ? 1 - upper / 2 : upper / 2;
}

/** erf(z) = 2/√π · e^{−z²} Σ 2ⁿ z^{2n+1} / (1·3·…·(2n+1)). */
function erfSeries(z: number): number {
  let term = z;
  let sum = z;
  for (let n = 1; n < 200; n++) {
    term *= (2 * z * z) / (2 * n + 1);
    sum += term;
    if (term < sum * 1e-17) break;
  }
  return (2 / Math.sqrt(Math.PI)) * Math.exp(-z * z) * sum;
}

/** erfc(z) = e^{−z²}/√π · 1/(z + (1/2)/(z + (2/2)/(z + …))). */
function erfcFraction(z: number): number {
  let fraction = z;
  for (let n = 120; n > 0; n--) fraction = z + n / 2 / fraction;
  return Math.exp(-z * z) / (Math.sqrt(Math.PI) * fraction);
}
