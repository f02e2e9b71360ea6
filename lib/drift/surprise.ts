import type { LookState } from "./lookState.ts";

/** Student quantiles passed once in two thousand values (R: qt(1 - 2.5e-4, df)), by degrees of freedom. */
const quantiles = new Map<number, number>([
  [3, 16.326],
  [4, 10.306],
  [5, 7.976],
  [7, 6.082],
  [10, 5.049],
  [15, 4.417],
  [30, 3.902],
  [200, 3.539],
]);

/** One-step standard deviations a surprise has at least, whatever the tails; more when recognised late. */
const fewestDeviations = 4;
const lateMargin = 0.5;

/** Values back to which a surprise may still be recognised once its neighbours bear it out. */
const lateBy = 4;

/** A value that stands alone: its time and its size in one-step standard deviations, signed. */
export interface Surprise {
  readonly time: number;
  readonly size: number;
}

/**
 * Finds one-off surprises among the newest values: the newest when its one-step error passes four standard
 * deviations (0.3 % a year of weekly looks for normal shocks) and the tail the reference showed, one of the four
 * before it when its outlier statistic passes half a deviation more. Largest first: each is taken out as what it
 * looks more like, a lone wild value or a shock that works on through the model (Chang, Tiao and Chen 1988), so
 * that its neighbours are not blamed for it.
 */
export function findSurprises(state: LookState, known: (time: number) => boolean): Surprise[] {
  const { reference, start, count, order, isGap } = state;
  const newest = count - 1;
  if (isGap[newest]) return [];
  const tail = (quantiles.get(reference.degreesOfFreedom) ?? 0) * reference.studentScale;
  const atOnce = Math.max(fewestDeviations, tail);
  const first = Math.max(start, newest - lateBy);
  const residuals = state.residuals.slice(first, count);
  const found: Surprise[] = [];
  const passed = new Set<number>();
  for (;;) {
    let largest: { time: number; ratio: number; size: number; additive: boolean } | undefined;
    for (let time = first; time < count; time++) {
      if (isGap[time] || passed.has(time)) continue;
      const additive = additiveOutlier(residuals, time - first, reference.weights, order);
      const shock = Math.abs(residuals[time - first]);
      const isAdditive = additive.ratio > shock;
      const ratio = Math.max(additive.ratio, shock);
      if (largest !== undefined && ratio <= largest.ratio) continue;
      largest = {
        time,
        ratio,
        size: isAdditive ? additive.size : residuals[time - first],
        additive: isAdditive,
      };
    }
    if (largest === undefined || largest.ratio < atOnce) return found;
    const { time, size, ratio } = largest;
    passed.add(time);
    if (!known(time) && (time === newest || ratio >= atOnce + lateMargin)) found.push({ time, size });
    if (!largest.additive) residuals[time - first] = 0;
    else
      for (let j = 0; j <= order && time + j < count; j++)
        residuals[time - first + j] -= size * reference.weights[j];
  }
}

/** ω̂ = Σ π_j e_{s+j} / Σ π_j² and its statistic |ω̂|·√(Σ π_j²), in shocks. */
function additiveOutlier(
  residuals: Float64Array,
  place: number,
  weights: Float64Array,
  order: number,
): { ratio: number; size: number } {
  let sum = 0;
  let squares = 0;
  for (let j = 0; j <= order && place + j < residuals.length; j++) {
    sum += weights[j] * residuals[place + j];
    squares += weights[j] ** 2;
  }
  return { ratio: Math.abs(sum) / Math.sqrt(squares), size: sum / squares };
}
