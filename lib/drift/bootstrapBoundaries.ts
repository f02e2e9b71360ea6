import { appendValue } from "./appendValue.ts";
import { look } from "./look.ts";
import { openLookState, watchedKinds } from "./lookState.ts";
import { fitReference, type Reference } from "./reference.ts";
import { pathSimulator, stableCoefficients } from "./simulatePath.ts";

/**
 * Largest statistic of each kind over a year of looks on `paths` stable paths of the reference's model, every
 * step redone on each: element [kind][path].
 */
export function stableMaxima(
  reference: Reference,
  looks: number,
  paths: number,
  seed: number,
): Float64Array[] {
  const start = reference.values.length;
  const simulate = pathSimulator(stableCoefficients(reference, 0.995), seed);
  const path = new Float64Array(start + looks);
  const maxima = watchedKinds(reference).map(() => new Float64Array(paths).fill(Number.NEGATIVE_INFINITY));
  for (let round = 0; round < paths; round++) {
    simulate(path);
    const own = fitReference(path.subarray(0, start), reference, reference.order, reference.order);
    const state = openLookState(own, looks, looks);
    for (let at = 0; at < looks; at++) {
      appendValue(state, (path[start + at] - own.centre) / own.scale);
      look(state);
      for (let kind = 0; kind < maxima.length; kind++)
        maxima[kind][round] = Math.max(maxima[kind][round], state.statistics[kind]);
    }
  }
  return maxima;
}

/**
 * Boundaries that spend the false-alarm rate in the given parts: α' is the `rate` quantile of the smallest rank
 * p-value divided by its kind's part, and each boundary the 1 − part·α' quantile of its own maxima.
 */
export function spentBoundaries(
  maxima: readonly Float64Array[],
  parts: readonly number[],
  rate: number,
): Float64Array {
  const paths = maxima[0].length;
  const smallest = new Float64Array(paths).fill(1);
  for (const [kind, own] of maxima.entries()) {
    const order = Array.from(own.keys()).sort((a, b) => own[b] - own[a]);
    order.forEach((path, rank) => {
      smallest[path] = Math.min(smallest[path], (rank + 1) / paths / parts[kind]);
    });
  }
  smallest.sort();
  const share = smallest[Math.max(0, Math.ceil(rate * paths) - 1)];
  return Float64Array.from(maxima, (own, kind) => {
    const sorted = Float64Array.from(own).sort();
    return sorted[Math.min(paths - 1, Math.max(0, Math.floor((1 - share * parts[kind]) * paths)))];
  });
}
