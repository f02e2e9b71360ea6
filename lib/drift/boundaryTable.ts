import type { Reference } from "./reference.ts";

export function boundaryFeatures(reference: Reference): number[] {
  const phi = reference.coefficients.slice(reference.coefficients.length - reference.order);
  let sum = 0;
  for (const x of phi) sum += x;
  // largest root by power of companion
  let r = 0;
  {
    let lo = 0.01,
      hi = 1.2;
    const stable = (m: number) => {
      let cur = phi.map((v, l) => v / m ** (l + 1));
      for (let s = cur.length; s > 0; s--) {
        const k = cur[s - 1];
        if (Math.abs(k) >= 1) return false;
        const nx = new Float64Array(s - 1);
        for (let l = 0; l < s - 1; l++) nx[l] = (cur[l] + k * cur[s - 2 - l]) / (1 - k * k);
        cur = nx;
      }
      return true;
    };
    for (let i = 0; i < 30; i++) {
      const m = (lo + hi) / 2;
      if (stable(m)) hi = m;
      else lo = m;
    }
    r = hi;
  }
  let k4 = 0,
    k2 = 0,
    n = 0;
  for (let t = reference.order; t < reference.residuals.length; t++) {
    const e = reference.residuals[t];
    k2 += e * e;
    k4 += e ** 4;
    n++;
  }
  return [
    reference.values.length,
    reference.order,
    sum,
    r,
    reference.deviation,
    1 / reference.degreesOfFreedom,
    reference.studentScale,
    k4 / n / (k2 / n) ** 2,
    phi[0],
  ];
}
