import { columnEvidence } from "./columnEvidence.ts";
import { addRow, clearSums, copySums } from "./columnSums.ts";
import { type LookState, lastChangeTime } from "./lookState.ts";

/**
 * ln BF at every change time τ of a lasting change of the autoregressive coefficients: the columns are the lags
 * (as deviations from the centreline) switched on at τ, their products suffix sums over the rows.
 */
export function weighPersistenceChanges(state: LookState): void {
  const { order, count, start, work, deviations } = state;
  const { lagTail, lagHere, lagRow, lagPriors } = work;
  const kind = state.kinds.indexOf("persistence");
  const last = Math.min(lastChangeTime(state), count - order - 1);
  clearSums(lagTail);
  for (let change = count - 1; change >= start; change--) {
    for (let lag = 1; lag <= order; lag++) lagRow[lag - 1] = deviations[change - lag];
    addRow(state, lagTail, change, lagRow, 0);
    if (change > last || state.isGap[change]) continue;
    copySums(lagTail, lagHere);
    state.logBayes[kind * state.capacity + change - start] = columnEvidence(state, lagHere, lagPriors);
  }
}
