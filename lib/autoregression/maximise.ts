import { minimise } from "../numeric/minimise.ts";
import { burgReflections, sharedReflections } from "./burg.ts";
import type { LikelihoodDesign } from "./likelihoodDesign.ts";
import type { ProfileLikelihood } from "./profileLikelihood.ts";

/** |artanh π| stays below this, which keeps 1 − π² above 1e-8. */
const EDGE = 10;

/**
 * artanh of the partial autocorrelations at the highest likelihood found. Complete series have one maximum that Burg's
 * estimate lies near; with gaps, or hardly more values than parameters, there may be others, so points spread evenly
 * over the stationary region are tried as well.
 */
export function maximise(likelihood: ProfileLikelihood, design: LikelihoodDesign): Float64Array {
  const { order } = likelihood;
  if (order === 0) return new Float64Array(0);
  const workspace = sharedReflections(design.length, order);
  burgReflections(design.series[0], 0, order, workspace);
  const burg = workspace.partials.slice(0, order).map((partial) => Math.atanh(0.999 * partial));
  const evaluate = (point: Float64Array, gradient: Float64Array) => likelihood.evaluate(point, gradient);
  // A series that is predicted perfectly has no likelihood at Burg's estimate: go in from the edge until it has one.
  for (let tries = 0; tries < 60 && !Number.isFinite(likelihood.valueAt(burg)); tries++) {
    for (let k = 0; k < order; k++) burg[k] *= 0.8;
  }
  let best = minimise(evaluate, burg, { bound: EDGE });
  for (let i = 0; i < extraStarts(design, order); i++) {
    const next = minimise(evaluate, spreadPoint(i, order), { bound: EDGE });
    if (next.value < best.value) best = next;
  }
  return best.point;
}

function extraStarts(design: LikelihoodDesign, order: number): number {
  const gaps = design.missing.length;
  const many = design.observations > 500;
  if (design.observations < 3 * order + 8 || (10 * gaps > design.length && !many)) return 8;
  return gaps > 0 ? 1 : 0;
}

const PRIMES = [2, 3, 5, 7, 11, 13, 17, 19, 23, 29, 31, 37, 41];

/** Point i of Halton's (1960) sequence in (−0.9, 0.9)^order, as artanh; the first is the origin. */
function spreadPoint(i: number, order: number): Float64Array {
  const point = new Float64Array(order);
  for (let k = 0; k < order && i > 0; k++) {
    const base = PRIMES[k % PRIMES.length];
    let fraction = 0;
    let share = 1 / base;
    for (let rest = i; rest > 0; rest = Math.floor(rest / base), share /= base)
      fraction += share * (rest % base);
    point[k] = Math.atanh(0.9 * (2 * fraction - 1));
  }
  return point;
}
