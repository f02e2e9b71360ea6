import { type LookState, lastChangeTime } from "./lookState.ts";
import { scaleGrid } from "./lookWork.ts";
import { addStudentRow } from "./studentTable.ts";

/** ln ρ of the changes tried, in steps of 0.1 of the σ grid. */
const logRatioSteps = [3, 4, 7, 11, -4, -7];
/** Place of the reference scale on the σ grid. */
const referenceScaleAt = 12;
/** The σ before the change may lie this far from the reference scale: −0.6..0.7 in ln σ. */
const firstScale = 6;
const endScale = 20;

/**
 * ln BF at every change time τ of a lasting change of the shock size by the factor ρ: Student log-likelihoods
 * of the residuals of the null fit on a grid of ln σ, max_σ[ℓ_{<τ}(σ) + ℓ_{≥τ}(ρσ)] − max_σ ℓ(σ), averaged
 * over ρ.
 */
export function weighShockSizeChanges(state: LookState): void {
  const { count, start, order, terms, cumulated, capacity, moment, shockValues, isGap } = state;
  const { table, beforeAll } = state.work;
  const lowestScale = Math.log(state.reference.studentScale) - 0.1 * referenceScaleAt;
  cumulated.fill(0, 0, scaleGrid);
  beforeAll.fill(0);
  let rowsBefore = 0;
  for (let time = order; time < count; time++) {
    const place = (time - start + 1) * scaleGrid;
    if (time >= start) cumulated.copyWithin(place, place - scaleGrid, place);
    if (isGap[time]) continue;
    let residual = shockValues[time];
    for (let i = 0; i < terms; i++) residual -= moment[i] * state.termRows[time * terms + i];
    for (let lag = 1; lag <= order; lag++) residual -= moment[terms + lag - 1] * shockValues[time - lag];
    if (time >= start) addStudentRow(table, residual, lowestScale, cumulated, place, scaleGrid);
    else {
      // Reference rows are always before the change, so only the scales tried before it matter.
      addStudentRow(
        table,
        residual,
        lowestScale + 0.1 * firstScale,
        beforeAll,
        firstScale,
        endScale - firstScale,
      );
      rowsBefore++;
    }
  }
  let rowsAfter = 0;
  for (let time = start; time < count; time++) if (!isGap[time]) rowsAfter++;
  const all = (count - start) * scaleGrid;
  let unchanged = Number.NEGATIVE_INFINITY;
  const rows = rowsBefore + rowsAfter;
  for (let i = firstScale; i < endScale; i++)
    unchanged = Math.max(unchanged, beforeAll[i] + cumulated[all + i] - rows * 0.1 * i);
  const kind = state.kinds.indexOf("shock-size");
  const last = lastChangeTime(state);
  for (let change = start, since = rowsAfter; change <= last; change++) {
    if (isGap[change]) continue;
    const before = (change - start) * scaleGrid;
    let total = 0;
    for (const steps of logRatioSteps) {
      let best = Number.NEGATIVE_INFINITY;
      const from = Math.max(firstScale, -steps);
      const to = Math.min(endScale, scaleGrid - steps);
      for (let i = from; i < to; i++) {
        const after = cumulated[all + i + steps] - cumulated[before + i + steps];
        const value = beforeAll[i] + cumulated[before + i] + after - rows * 0.1 * i;
        if (value > best) best = value;
      }
      total += Math.exp(Math.min(best - since * 0.1 * steps - unchanged, 600));
    }
    state.logBayes[kind * capacity + change - start] = Math.log(total / logRatioSteps.length);
    since--;
  }
}
