import { columnEvidence } from "./columnEvidence.ts";
import { addRow, clearSums, copySums } from "./columnSums.ts";
import { type DirectedPrior, directedEvidence } from "./directedEvidence.ts";
import { logMixture } from "./logMixture.ts";
import { type LookState, lastChangeTime } from "./lookState.ts";

/** With more lags than one, this share of the prior moves the first alone and the rest all of them freely. */
const firstAlone = 0.5;

/**
 * ln BF at every change time τ of a lasting change of the autoregressive coefficients: the columns are the lags
 * (as deviations from the centreline) switched on at τ, their products suffix sums over the rows. A change of the
 * first lag is directed, because how far persistence may move differs with the direction (see changePrior).
 */
export function weighPersistenceChanges(state: LookState): void {
  const { order, count, start, work, deviations } = state;
  const { lagTail, lagHere, lagRow, lagPriors, lagColumn } = work;
  const kind = state.kinds.indexOf("persistence");
  const last = Math.min(lastChangeTime(state), count - order - 1);
  const prior = changePrior(state);
  clearSums(lagTail);
  for (let change = count - 1; change >= start; change--) {
    for (let lag = 1; lag <= order; lag++) lagRow[lag - 1] = deviations[change - lag];
    addRow(state, lagTail, change, lagRow, 0);
    if (change > last || state.isGap[change]) continue;
    let logBayes = directedEvidence(state, lagTail, prior, lagColumn);
    if (order > 1) {
      copySums(lagTail, lagHere);
      logBayes = logMixture(logBayes, columnEvidence(state, lagHere, lagPriors), firstAlone);
    }
    state.logBayes[kind * state.capacity + change - start] = logBayes;
  }
}

/**
 * A rise is expected to take about a third of the way to a unit root, a fall about half of the way to none: one
 * symmetric prior spends most of the false-alarm rate on rises near a unit root that the series cannot make.
 */
function changePrior({ reference, terms }: LookState): DirectedPrior {
  const persistence = reference.coefficients.subarray(terms).reduce((sum, value) => sum + value, 0);
  return {
    rise: Math.max(0.05, 0.35 * (1 - persistence)),
    fall: Math.max(0.15, 0.5 * persistence),
    rises: 0.55,
  };
}
