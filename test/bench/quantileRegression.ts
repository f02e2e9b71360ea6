import { backwardSolve, factorInPlace, forwardSolve } from "../../lib/drift/smallMatrix.ts";

/** Width of the logistic kernel that smooths the check function, and the wider ones on the way there. */
const widths = [1, 0.4, 0.16, 0.08];

/**
 * Linear regression of the `probability` quantile of `response` on `rows` (Koenker and Bassett 1978): Newton steps
 * with halving on the check function smoothed with a logistic kernel, columns scaled to unit size, a trace of ridge.
 * Starts from the quantile of all responses, or from `from`, the solution for a probability nearby.
 */
export function quantileRegression(
  rows: readonly (readonly number[])[],
  response: ArrayLike<number>,
  probability: number,
  from?: Float64Array,
): Float64Array {
  const size = rows[0].length;
  const scales = Array.from({ length: size }, (_, i) =>
    Math.sqrt(rows.reduce((sum, row) => sum + row[i] * row[i], 0) / rows.length),
  ).map((scale) => (scale > 0 ? scale : 1));
  const flat = new Float64Array(rows.length * size);
  rows.forEach((row, n) => {
    for (let i = 0; i < size; i++) flat[n * size + i] = row[i] / scales[i];
  });
  let beta: Float64Array = new Float64Array(size);
  if (from !== undefined) beta = Float64Array.from(from, (value, i) => value * scales[i]);
  else beta[0] = Float64Array.from(response).sort()[Math.floor(probability * rows.length)] * scales[0];
  const problem = { flat, size, response, probability };
  for (const width of from === undefined ? widths : widths.slice(-2)) beta = minimise(problem, beta, width);
  return beta.map((value, i) => value / scales[i]);
}

interface Problem {
  readonly flat: Float64Array;
  readonly size: number;
  readonly response: ArrayLike<number>;
  readonly probability: number;
}

const ridge = 0.01;

function minimise(problem: Problem, start: Float64Array, width: number): Float64Array {
  const { flat, size, response, probability } = problem;
  let beta = start;
  let loss = lossOf(problem, beta, width);
  for (let step = 0; step < 40; step++) {
    const gradient = new Float64Array(size);
    const curvature = new Float64Array(size * size);
    for (let n = 0; n < response.length; n++) {
      const above = 1 / (1 + Math.exp(-restOf(problem, beta, n) / width));
      const slope = above - (1 - probability);
      const bend = (above * (1 - above)) / width;
      for (let i = 0; i < size; i++) {
        const value = flat[n * size + i];
        gradient[i] += slope * value;
        if (bend < 1e-6) continue;
        for (let j = 0; j <= i; j++) curvature[i * size + j] += bend * value * flat[n * size + j];
      }
    }
    for (let i = 0; i < size; i++) {
      gradient[i] -= ridge * beta[i];
      curvature[i * size + i] += ridge;
    }
    factorInPlace(curvature, size);
    forwardSolve(curvature, size, gradient);
    backwardSolve(curvature, size, gradient);
    let part = 1;
    let moved = beta;
    let reached = Number.POSITIVE_INFINITY;
    for (; part > 1e-4 && !(reached < loss); part /= 2) {
      const share = part;
      moved = beta.map((value, i) => value + share * gradient[i]);
      reached = lossOf(problem, moved, width);
    }
    if (!(reached < loss)) break;
    const gain = loss - reached;
    beta = moved;
    loss = reached;
    if (gain < 1e-5) break;
  }
  return beta;
}

/** Σ of the smoothed check function, w·ln(1 + e^{r/w}) − (1 − p)·r, and the ridge. */
function lossOf(problem: Problem, beta: Float64Array, width: number): number {
  const { response, probability } = problem;
  let loss = 0;
  for (const value of beta) loss += 0.5 * ridge * value * value;
  for (let n = 0; n < response.length; n++) {
    const rest = restOf(problem, beta, n);
    const soft = rest / width > 30 ? rest : width * Math.log1p(Math.exp(rest / width));
    loss += soft - (1 - probability) * rest;
  }
  return loss;
}

function restOf({ flat, size, response }: Problem, beta: Float64Array, n: number): number {
  let rest = response[n];
  for (let i = 0, at = n * size; i < size; i++) rest -= beta[i] * flat[at + i];
  return rest;
}
