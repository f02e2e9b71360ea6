import { explain, openExplainer, setChange } from "./explain.ts";
import { type LookState, lastChangeTime } from "./lookState.ts";

/** ln ρ tried for the shock size when kinds are weighed together. */
const logRatios = [0.3, 0.4, 0.7, 1.1, -0.4, -0.7];
/** Prior weight of all single kinds, all pairs, all triples. */
const priorBySize = [0, 0.75, 0.21, 0.04];

/** One set of the kinds at one change time, with its log weight (prior times marginal likelihood). */
export interface Explanation {
  /** Bit k stands for kind k of the state. */
  readonly kinds: number;
  readonly time: number;
  readonly logRatio: number;
  readonly logWeight: number;
}

/**
 * Marginal likelihoods of all sets of up to three kinds of change at a common time, for every time: see explain.
 */
export function weighExplanations(state: LookState): Explanation[] {
  const { kinds, start } = state;
  const explainer = openExplainer(state);
  const shock = 1 << kinds.indexOf("shock-size");
  const sets = setsOf(kinds.length);
  const numberOf = [0, 1, 2, 3].map((size) => sets.filter((set) => countBits(set) === size).length);
  const explanations: Explanation[] = [];
  for (let time = lastChangeTime(state); time >= start; time--) {
    if (state.isGap[time]) continue;
    setChange(explainer, time);
    for (const set of sets) {
      const chosen = explainer.plan.columnsOf(set);
      const size = countBits(set);
      const prior = Math.log(priorBySize[size] / numberOf[size]);
      if (!(set & shock)) {
        explanations.push({
          kinds: set,
          time,
          logRatio: 0,
          logWeight: prior + explain(explainer, chosen, 0),
        });
        continue;
      }
      const share = prior - Math.log(logRatios.length);
      for (const logRatio of logRatios)
        explanations.push({
          kinds: set,
          time,
          logRatio,
          logWeight: share + explain(explainer, chosen, logRatio),
        });
    }
  }
  return explanations;
}

/** All sets of one to three of `count` kinds, as bits. */
function setsOf(count: number): number[] {
  const all = Array.from({ length: (1 << count) - 1 }, (_, i) => i + 1);
  return all.filter((set) => countBits(set) <= 3);
}

function countBits(set: number): number {
  let bits = 0;
  for (let rest = set; rest > 0; rest >>= 1) bits += rest & 1;
  return bits;
}
