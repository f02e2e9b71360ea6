import { cleanOutliers, watching } from "./cleanOutliers.ts";
import type { LookState } from "./lookState.ts";
import { weighMeanChanges } from "./meanEvidence.ts";
import { fitNull } from "./nullFit.ts";
import { weighPersistenceChanges } from "./persistenceEvidence.ts";
import { weighShockSizeChanges } from "./shockSizeEvidence.ts";

/**
 * One look at everything that has arrived: leaves ln BF by kind and change time, and by kind the statistic
 * X = ln{[Σ_τ BF_τ + (looks − #τ)] / looks}, the average likelihood ratio over all change times of the year,
 * those not yet judged counting one.
 */
export function look(state: LookState): void {
  state.logBayes.fill(Number.NEGATIVE_INFINITY);
  cleanOutliers(state, watching);
  fitNull(state);
  weighMeanChanges(state);
  weighPersistenceChanges(state);
  weighShockSizeChanges(state);
  const times = state.count - state.start;
  for (let kind = 0; kind < state.kinds.length; kind++) {
    let total = 0;
    let judged = 0;
    for (let time = 0; time < times; time++) {
      const logBayes = state.logBayes[kind * state.capacity + time];
      if (logBayes === Number.NEGATIVE_INFINITY) continue;
      total += Math.exp(Math.min(logBayes, 600));
      judged++;
    }
    state.sums[kind] = total;
    state.judged[kind] = judged;
    state.statistics[kind] = Math.log((total + Math.max(0, state.looks - judged)) / state.looks);
  }
}
