import { cleanOutliers, naming } from "./cleanOutliers.ts";
import { type Explanation, weighExplanations } from "./jointEvidence.ts";
import type { LookState } from "./lookState.ts";
import type { ChangeKind, ChangeNotice } from "./notice.ts";
import { fitNull } from "./nullFit.ts";
import { weighKinds } from "./weighKinds.ts";

/** What a change most likely was, and when. Times count from the first reference value. */
export interface NamedChange {
  readonly kind: ChangeKind;
  readonly alternative: ChangeKind | null;
  readonly time: number;
  readonly low: number;
  readonly high: number;
  /** The single best set of kinds that holds `kind`, at `time`. */
  readonly best: Explanation;
}

/** Two kinds whose scores lie closer than this (a probability within a third) are both named. */
const nearTie = 1.1;

/**
 * Names and dates a change: the log odds of each kind's taking part, over all sets of kinds and all change times,
 * are weighed into scores (see weighKinds); the date is the posterior mode, its range the 5 % and 95 % points of
 * the posterior. To be called right after a look.
 */
export function nameChange(
  state: LookState,
  boundaries: ArrayLike<number>,
  status: ChangeNotice["status"],
): NamedChange {
  cleanOutliers(state, naming);
  fitNull(state);
  const explanations = weighExplanations(state);
  const logOdds = state.kinds.map((_, index) => {
    const bit = 1 << index;
    const taking = logSum(explanations.filter(({ kinds }) => kinds & bit));
    return taking - logSum(explanations.filter(({ kinds }) => !(kinds & bit)));
  });
  const { time, low, high } = dateChange(state, explanations);
  const scores = weighKinds(state, logOdds, boundaries, status);
  const ranked = [...scores.keys()].sort((a, b) => scores[b] - scores[a]);
  const [first, second] = ranked;
  const holding = explanations.filter((one) => one.time === time && one.kinds & (1 << first));
  const best = holding.reduce((a, b) => (b.logWeight > a.logWeight ? b : a));
  return {
    kind: state.kinds[first],
    alternative: scores[first] - scores[second] < nearTie ? state.kinds[second] : null,
    time,
    low,
    high,
    best,
  };
}

function dateChange(
  state: LookState,
  explanations: readonly Explanation[],
): { time: number; low: number; high: number } {
  const total = logSum(explanations);
  const weights = new Float64Array(state.count - state.start);
  for (const { time, logWeight } of explanations) weights[time - state.start] += Math.exp(logWeight - total);
  let mode = 0;
  let below = 0;
  let low = -1;
  let high = -1;
  for (let at = 0; at < weights.length; at++) {
    if (weights[at] > weights[mode]) mode = at;
    below += weights[at];
    if (low < 0 && below >= 0.05) low = at;
    if (high < 0 && below >= 0.95) high = at;
  }
  const { start } = state;
  return { time: start + mode, low: start + Math.min(low, mode), high: start + Math.max(high, mode) };
}

function logSum(explanations: readonly Explanation[]): number {
  let largest = Number.NEGATIVE_INFINITY;
  for (const { logWeight } of explanations) largest = Math.max(largest, logWeight);
  if (largest === Number.NEGATIVE_INFINITY) return largest;
  let sum = 0;
  for (const { logWeight } of explanations) sum += Math.exp(logWeight - largest);
  return largest + Math.log(sum);
}
