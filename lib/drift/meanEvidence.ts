import { columnEvidence } from "./columnEvidence.ts";
import { addRow, type ColumnSums, clearSums, copySums } from "./columnSums.ts";
import { type LookState, lastChangeTime } from "./lookState.ts";

/**
 * ln BF at every change time τ of a lasting change of level, of slope and of seasonal pattern. The column of a
 * change from τ on is φ̂(B) applied to the term switched on at τ: after the first p rows it is the filtered
 * term itself, so its products with everything are sums over the rows from τ + p on, taken from the end
 * backwards, plus p rows of their own.
 */
export function weighMeanChanges(state: LookState): void {
  const { reference, order, terms, count, start, work } = state;
  const { tail, here, switched } = work;
  const last = lastChangeTime(state);
  clearSums(tail);
  for (let change = count - 1; change >= start; change--) {
    const settled = change + order;
    if (settled < count) addRow(state, tail, settled, state.filteredTerms, settled * terms);
    if (change > last || state.isGap[change]) continue;
    copySums(tail, here);
    for (let step = 0; step < order && change + step < count; step++) {
      const time = change + step;
      for (let g = 0; g < terms; g++) {
        let sum = 0;
        for (let j = 0; j <= step; j++) sum += reference.weights[j] * state.termRows[(time - j) * terms + g];
        switched[g] = sum;
      }
      addRow(state, here, time, switched, 0);
    }
    for (const { kind, first, sums, priors } of work.meanKinds) {
      takeColumns(state, here, first, sums);
      // A slope turns at τ without a jump: the line less its value just before τ.
      if (state.kinds[kind] === "trend")
        subtractLevel(state, here, sums, state.termRows[(change - 1) * terms + first]);
      state.logBayes[kind * state.capacity + change - start] = columnEvidence(state, sums, priors);
    }
  }
}

/** Copies the sums of columns first, first + 1, … out of the sums of all terms. */
function takeColumns(state: LookState, from: ColumnSums, first: number, to: ColumnSums): void {
  const { columns } = state;
  for (let i = 0; i < to.size; i++) {
    const source = first + i;
    for (let k = 0; k < columns; k++) to.cross[i * columns + k] = from.cross[source * columns + k];
    for (let j = 0; j <= i; j++) to.own[i * to.size + j] = from.own[source * from.size + first + j];
    to.moment[i] = from.moment[source];
  }
}

/** Turns the sums of the line (column 1) into those of the line less `times` the level (column 0). */
function subtractLevel(state: LookState, from: ColumnSums, line: ColumnSums, times: number): void {
  for (let k = 0; k < state.columns; k++) line.cross[k] -= times * from.cross[k];
  line.own[0] += times * times * from.own[0] - 2 * times * from.own[from.size];
  line.moment[0] -= times * from.moment[0];
}
