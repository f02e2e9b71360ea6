import type { LookState } from "./lookState.ts";
import { judgePatch, type Patch, scoreValues } from "./outlierPatch.ts";

/** How many neighbours may be removed together, and beyond how many standard errors the first, second and third time. */
interface CleaningRule {
  readonly beyond: readonly number[];
  readonly longest: number;
}

/**
 * For the statistics, and for naming a change, where a value taken out is evidence lost. A second patch must be gross:
 * taking out any past 4 cost two to five points of the power against larger shocks, which bring several large values;
 * past 6 it costs none that 600 series show, and two one-offs of 8 in a year bring a notice in 6 instead of 95 of 100.
 */
export const watching: CleaningRule = { beyond: [4, 6, 6], longest: 3 };
export const naming: CleaningRule = { beyond: [4], longest: 1 };
/** The shock size loses only what is plainly no shock of the model's, by this many standard errors. */
const forShockSizeBeyond = 4.2;
/**
 * What two and three neighbours must pass beyond a single value, in standard errors: less would take out the first
 * values of larger shocks too often, more would take wild neighbours for them.
 */
const patchMargins = [0, 0, 0.8, 1.3];

/**
 * Makes the cleaned copies anew from the raw values: the monitored value, or patch of two or three neighbours,
 * that is most beyond its limit is moved back to where the model puts it (additive outliers: Chang, Tiao and
 * Chen 1988; patches: Justel, Peña and Tsay 2001), until none passes or the rule allows no more. Patches
 * are tried as one because neighbours hide each other. Starting from the raw values at every look lets a value
 * that looked wild alone come back once later ones bear it out.
 */
export function cleanOutliers(state: LookState, rule: CleaningRule): void {
  const { reference, start, count, order, cleaned, cleanedResiduals, shockValues, outliers } = state;
  const { weights } = reference;
  for (let time = start; time < count; time++) {
    cleaned[time] = state.values[time];
    cleanedResiduals[time] = state.residuals[time];
    shockValues[time] = state.values[time];
  }
  state.outlierCount = 0;
  for (const beyond of rule.beyond) {
    const { patch } = state.work;
    const found = largestPatch(state, beyond, rule.longest, patch);
    if (!found) return;
    const limit = forShockSizeBeyond + patchMargins[patch.length];
    const cleansShockSize = patch.statistic > limit * limit;
    for (let i = 0; i < patch.length; i++) {
      const time = patch.time + i;
      const size = patch.sizes[i];
      cleaned[time] -= size;
      if (cleansShockSize) shockValues[time] -= size;
      for (let j = 0; j <= order && time + j < count; j++) cleanedResiduals[time + j] -= size * weights[j];
      outliers[state.outlierCount++] = time;
    }
  }
}

/**
 * Finds the patch whose statistic is furthest past its limit, `beyond` for a single value, among those that still may be removed. By the difference,
 * not the factor: of two wild neighbours of opposite sign one alone may pass its lower limit by the larger factor.
 */
function largestPatch(state: LookState, beyond: number, longest: number, best: Patch): boolean {
  const { start, count } = state;
  const { candidate } = state.work;
  scoreValues(state);
  let excess = 0;
  for (let time = start; time < count; time++) {
    for (let length = 1; length <= longest && time + length <= count; length++) {
      if (isTaken(state, time + length - 1)) break;
      judgePatch(state, time, length, candidate);
      const limit = beyond + patchMargins[length];
      const past = candidate.statistic - limit * limit;
      if (past <= excess) continue;
      excess = past;
      best.time = time;
      best.length = length;
      best.statistic = candidate.statistic;
      best.sizes.set(candidate.sizes);
    }
  }
  return excess > 0;
}

function isTaken(state: LookState, time: number): boolean {
  if (state.isGap[time]) return true;
  for (let i = 0; i < state.outlierCount; i++) if (state.outliers[i] === time) return true;
  return false;
}
