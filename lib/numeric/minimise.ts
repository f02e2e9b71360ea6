import { factorCholesky, solveCholesky } from "./cholesky.ts";

/** Value at `point`, with the gradient written into the second argument. Infinite outside its domain. */
export type SmoothFunction = (point: Float64Array, gradient: Float64Array) => number;

export interface Minimum {
  readonly point: Float64Array;
  readonly value: number;
  readonly evaluations: number;
  /** False when the iteration limit came first. */
  readonly converged: boolean;
}

const SLOPE_STEP = 1e-5;

/**
 * Minimum of a smooth function inside the box |x_i| ≤ bound, by BFGS (Nocedal & Wright 2006, chapter 6) that
 * starts from a Hessian of differenced gradients and halves steps until the value falls enough. Stops when the
 * predicted further fall is below `tolerance`, or when rounding allows none. Makes no arrays per iteration.
 */
export function minimise(
  f: SmoothFunction,
  start: ArrayLike<number>,
  { bound = 10, tolerance = 1e-11, iterations = 200 } = {},
): Minimum {
  const size = start.length;
  let point = Float64Array.from(start, (value) => Math.max(-bound, Math.min(bound, value)));
  let gradient = new Float64Array(size);
  let trial = new Float64Array(size);
  let trialGradient = new Float64Array(size);
  const direction = new Float64Array(size);
  const work = new Float64Array(size);
  let value = f(point, gradient);
  let evaluations = 1;
  const inverse = initialInverse(f, point, gradient, trial, trialGradient);
  evaluations += size;
  for (let iteration = 0; iteration < iterations; iteration++) {
    const slope = descent(inverse, gradient, point, bound, direction);
    if (-slope < tolerance) return { point, value, evaluations, converged: true };
    // A first guess of the Hessian may be far off: no coordinate moves by more than 2 at once.
    let longest = 0;
    for (let i = 0; i < size; i++) longest = Math.max(longest, Math.abs(direction[i]));
    let step = Math.min(1, 2 / longest);
    let trialValue = Number.POSITIVE_INFINITY;
    for (let halving = 0; halving < 40; halving++, step /= 2) {
      for (let i = 0; i < size; i++) {
        trial[i] = Math.max(-bound, Math.min(bound, point[i] + step * direction[i]));
      }
      trialValue = f(trial, trialGradient);
      evaluations++;
      if (trialValue <= value + 1e-4 * step * slope) break;
    }
    if (!(trialValue < value)) {
      return { point, value, evaluations, converged: -slope < 1e-6 };
    }
    updateInverse(inverse, point, gradient, trial, trialGradient, work);
    [point, trial] = [trial, point];
    [gradient, trialGradient] = [trialGradient, gradient];
    value = trialValue;
  }
  return { point, value, evaluations, converged: false };
}

/** Quasi-Newton direction, with coordinates held that the box stops; returns the slope along it. */
function descent(
  inverse: Float64Array,
  gradient: Float64Array,
  point: Float64Array,
  bound: number,
  direction: Float64Array,
): number {
  const size = gradient.length;
  const held = (i: number) => Math.abs(point[i]) >= bound && point[i] * gradient[i] < 0;
  let slope = 0;
  for (let i = 0; i < size; i++) {
    let sum = 0;
    if (!held(i)) {
      for (let j = 0; j < size; j++) if (!held(j)) sum -= inverse[i * size + j] * gradient[j];
    }
    direction[i] = sum;
    slope += sum * gradient[i];
  }
  return slope;
}

/** Inverse of the differenced Hessian, or a scaled unit matrix where that is not positive definite. */
function initialInverse(
  f: SmoothFunction,
  point: Float64Array,
  gradient: Float64Array,
  trial: Float64Array,
  trialGradient: Float64Array,
): Float64Array {
  const size = point.length;
  const hessian = new Float64Array(size * size);
  for (let i = 0; i < size; i++) {
    trial.set(point);
    const step = point[i] > 0 ? -SLOPE_STEP : SLOPE_STEP;
    trial[i] += step;
    f(trial, trialGradient);
    for (let j = 0; j < size; j++) hessian[i * size + j] = (trialGradient[j] - gradient[j]) / step;
  }
  let diagonal = 0;
  for (let i = 0; i < size; i++) {
    diagonal = Math.max(diagonal, Math.abs(hessian[i * size + i]));
    for (let j = 0; j < i; j++) {
      hessian[i * size + j] = (hessian[i * size + j] + hessian[j * size + i]) / 2;
    }
  }
  const inverse = new Float64Array(size * size);
  const usable = factorCholesky(hessian, size);
  const column = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    column.fill(0);
    column[i] = 1;
    if (usable) solveCholesky(hessian, size, column);
    else column[i] = 1 / (diagonal || 1);
    for (let j = 0; j < size; j++) inverse[j * size + i] = column[j];
  }
  return inverse;
}

/** BFGS update of the inverse Hessian, left out where the curvature along the step is not positive. */
function updateInverse(
  inverse: Float64Array,
  point: Float64Array,
  gradient: Float64Array,
  next: Float64Array,
  nextGradient: Float64Array,
  work: Float64Array,
): void {
  const size = point.length;
  let curvature = 0;
  let quadratic = 0;
  for (let i = 0; i < size; i++) curvature += (next[i] - point[i]) * (nextGradient[i] - gradient[i]);
  if (!(curvature > 0)) return;
  for (let i = 0; i < size; i++) {
    work[i] = 0;
    for (let j = 0; j < size; j++) work[i] += inverse[i * size + j] * (nextGradient[j] - gradient[j]);
    quadratic += work[i] * (nextGradient[i] - gradient[i]);
  }
  const scale = (curvature + quadratic) / (curvature * curvature);
  for (let i = 0; i < size; i++) {
    const moveI = next[i] - point[i];
    for (let j = 0; j < size; j++) {
      const moveJ = next[j] - point[j];
      inverse[i * size + j] += scale * moveI * moveJ - (work[i] * moveJ + moveI * work[j]) / curvature;
    }
  }
}
