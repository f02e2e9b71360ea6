import { studentNumbers, uniformNumbers } from "./randomNumbers.ts";
import type { Reference } from "./reference.ts";

/**
 * A function that writes fresh stable paths of the reference's autoregression into `out`: Student shocks with
 * six degrees of freedom (tails between the normal and the heaviest a reference usually shows), 300 values of
 * warm-up, the terms left out because the statistics do not depend on them.
 */
export function pathSimulator(coefficients: Float64Array, seed: number): (out: Float64Array) => void {
  const shock = studentNumbers(uniformNumbers(seed), 6);
  const order = coefficients.length;
  const recent = new Float64Array(Math.max(1, order));
  return (out) => {
    recent.fill(0);
    for (let time = -300; time < out.length; time++) {
      let value = shock();
      for (let lag = 0; lag < order; lag++) value += coefficients[lag] * recent[lag];
      for (let lag = order - 1; lag > 0; lag--) recent[lag] = recent[lag - 1];
      if (order > 0) recent[0] = value;
      if (time >= 0) out[time] = value;
    }
  };
}

/** φ̂ of a reference, shrunk as φ_j·c^j until no root is beyond `largest`. */
export function stableCoefficients(reference: Reference, largest: number): Float64Array {
  const coefficients = reference.coefficients.slice(reference.coefficients.length - reference.order);
  for (let round = 0; round < 200 && !isStable(coefficients, largest); round++)
    for (let lag = 0, factor = 0.995; lag < coefficients.length; lag++, factor *= 0.995)
      coefficients[lag] *= factor;
  return coefficients;
}

/** Whether all roots lie within `largest`: the Schur–Cohn recursion on φ_j / largest^j. */
export function isStable(coefficients: Float64Array, largest: number): boolean {
  let current = coefficients.map((value, lag) => value / largest ** (lag + 1));
  for (let size = current.length; size > 0; size--) {
    const partial = current[size - 1];
    if (Math.abs(partial) >= 1) return false;
    const next = new Float64Array(size - 1);
    for (let lag = 0; lag < size - 1; lag++)
      next[lag] = (current[lag] + partial * current[size - 2 - lag]) / (1 - partial * partial);
    current = next;
  }
  return true;
}
