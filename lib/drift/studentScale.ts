/** Degrees of freedom tried for the innovations, with the constant of the t density (no scale). */
const candidates = [3, 4, 5, 7, 10, 15, 30, 200].map((degreesOfFreedom) => ({
  degreesOfFreedom,
  constant:
    logGammaHalf(degreesOfFreedom + 1) - logGammaHalf(degreesOfFreedom) - 0.5 * Math.log(degreesOfFreedom),
}));

/** ln Γ(twice / 2) for whole `twice`, by recursion from Γ(1) and Γ(1/2). */
function logGammaHalf(twice: number): number {
  let logarithm = twice % 2 === 0 ? 0 : 0.5 * Math.log(Math.PI);
  for (let at = twice - 2; at > 0; at -= 2) logarithm += Math.log(at / 2);
  return logarithm;
}

export interface StudentShape {
  readonly degreesOfFreedom: number;
  readonly scale: number;
}

/**
 * Shape and scale of Student's t for centred `residuals` by likelihood: the scale by eight steps of the
 * fixed-point iteration σ² = mean((ν+1)e²/(ν+e²/σ²)), ν over {3, 4, 5, 7, 10, 15, 30, 200}, where 200 stands
 * for the normal. `deviation` is the least-squares standard deviation the iteration starts from.
 */
export function studentShape(residuals: Float64Array, deviation: number): StudentShape {
  const count = residuals.length;
  let best: StudentShape = { degreesOfFreedom: 200, scale: deviation };
  let bestLikelihood = Number.NEGATIVE_INFINITY;
  for (const { degreesOfFreedom: nu, constant } of candidates) {
    let scale = deviation * Math.sqrt(nu > 3 ? (nu - 2) / nu : 0.5);
    for (let step = 0; step < 8; step++) {
      const square = scale * scale;
      let sum = 0;
      for (let i = 0; i < count; i++) {
        const e2 = residuals[i] * residuals[i];
        sum += ((nu + 1) * e2) / (nu + e2 / square);
      }
      scale = Math.sqrt(sum / count);
    }
    let tails = 0;
    for (let i = 0; i < count; i++) tails += Math.log1p((residuals[i] / scale) ** 2 / nu);
    const likelihood = count * (constant - Math.log(scale)) - 0.5 * (nu + 1) * tails;
    if (likelihood > bestLikelihood + 1e-9) {
      bestLikelihood = likelihood;
      best = { degreesOfFreedom: nu, scale };
    }
  }
  return best;
}
