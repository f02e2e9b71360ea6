import { appendValue } from "../../lib/drift/appendValue.ts";
import { boundaryFeatures } from "../../lib/drift/boundaryFeatures.ts";
import { clusteringAllowance } from "../../lib/drift/clustering.ts";
import { look } from "../../lib/drift/look.ts";
import { openLookState, watchedKinds } from "../../lib/drift/lookState.ts";
import type { ChangeKind } from "../../lib/drift/notice.ts";
import { uniformNumbers } from "../../lib/drift/randomNumbers.ts";
import { fitReference } from "../../lib/drift/reference.ts";
import type { TermPlan } from "../../lib/drift/terms.ts";
import { polarNormal } from "../../lib/numeric/polarNormal.ts";

/** What one stable path showed: the features of its reference, and each kind's largest statistic for each number of looks. */
export interface StablePath {
  readonly kinds: readonly ChangeKind[];
  readonly features: readonly number[];
  readonly maxima: readonly { readonly looks: number; readonly values: readonly number[] }[];
}

const lookCounts = [8, 13, 26, 52, 104];

/**
 * Watches a stable autoregression drawn at random the way the monitor would: order 0 to 4 by random partial
 * autocorrelations (a tenth of the paths near a unit root), normal or Student shocks, a reference of 40 to 320
 * values, the order chosen from it (or given, in a quarter of the paths).
 */
export function watchStablePath(seed: number, plan: TermPlan, looks: number): StablePath {
  const uniform = uniformNumbers(seed);
  const normal = polarNormal(uniform);
  const shortest =
    40 + 3 * (plan.trend ? 1 : 0) + 2 * plan.season * (plan.season > 0 && plan.season <= 12 ? 1 : 0);
  const start = Math.round(shortest * (320 / shortest) ** uniform());
  const coefficients = drawCoefficients(uniform);
  const degreesOfFreedom = [0, 0, 0, 0, 0, 10, 6, 5, 5, 4][Math.floor(10 * uniform())];
  const shock = () => (degreesOfFreedom === 0 ? normal() : student(normal, degreesOfFreedom));
  const path = new Float64Array(start + looks);
  for (let time = -300, recent = new Float64Array(4); time < path.length; time++) {
    let value = shock();
    for (let lag = 0; lag < coefficients.length; lag++) value += coefficients[lag] * recent[lag];
    recent.copyWithin(1, 0, 3);
    recent[0] = value;
    if (time >= 0) path[time] = value;
  }
  const maxOrder = Math.max(1, Math.min(8, Math.floor(start / 12)));
  const given = uniform() < 0.25 ? Math.max(1, coefficients.length) : undefined;
  const reference = fitReference(path.slice(0, start), plan, given, maxOrder);
  const state = openLookState(reference, looks, looks);
  const allowance = clusteringAllowance(reference);
  const shockSize = watchedKinds(plan).indexOf("shock-size");
  const counts = lookCounts.filter((count) => count <= looks);
  const maxima = counts.map((count) => ({ looks: count, values: watchedKinds(plan).map(() => -9) }));
  for (let at = 0; at < looks; at++) {
    appendValue(state, (path[start + at] - reference.centre) / reference.scale);
    look(state);
    for (const { looks: count, values } of maxima) {
      if (at >= count) continue;
      for (let kind = 0; kind < values.length; kind++) {
        const unjudged = Math.max(0, count - state.judged[kind]);
        values[kind] = Math.max(values[kind], Math.log((state.sums[kind] + unjudged) / count));
      }
    }
  }
  // The monitor adds the allowance to the fitted boundary; the fit must know it, or the rate would not be met.
  for (const { values } of maxima) values[shockSize] -= allowance;
  return { kinds: watchedKinds(plan), features: boundaryFeatures(reference), maxima };
}

function student(normal: () => number, degreesOfFreedom: number): number {
  let sum = 0;
  for (let i = 0; i < degreesOfFreedom; i++) sum += normal() ** 2;
  return normal() * Math.sqrt((degreesOfFreedom - 2) / sum);
}

/** Mostly one lag: 0, 1, 2, 3, 4 lags in 10, 62, 18, 6 and 4 of 100 paths. */
function drawOrder(uniform: number): number {
  return [0.1, 0.72, 0.9, 0.96].filter((edge) => uniform >= edge).length;
}

/** Coefficients from partial autocorrelations (Durbin–Levinson). */
function drawCoefficients(uniform: () => number): Float64Array {
  const order = drawOrder(uniform());
  let coefficients = new Float64Array(0);
  for (let size = 1; size <= order; size++) {
    const near = size === 1 && uniform() < 0.2;
    const first = near ? 0.9 + 0.095 * uniform() : -0.4 + 1.35 * uniform();
    const partial = size === 1 ? first : (1.3 * uniform() - 0.7) * 0.85 ** (size - 2);
    const next = new Float64Array(size);
    for (let lag = 0; lag < size - 1; lag++)
      next[lag] = coefficients[lag] - partial * coefficients[size - 2 - lag];
    next[size - 1] = partial;
    coefficients = next;
  }
  return coefficients;
}
