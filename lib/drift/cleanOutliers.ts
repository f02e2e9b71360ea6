import type { LookState } from "./lookState.ts";

/** How many outliers may be removed, and beyond how many standard errors. */
interface CleaningRule {
  readonly beyond: number;
  readonly most: number;
}

/** For the statistics, and for naming a change, where a value taken out is evidence lost. */
export const watching: CleaningRule = { beyond: 3.5, most: 3 };
export const naming: CleaningRule = { beyond: 4, most: 1 };
/** The shock size loses only what is plainly no shock of the model's. */
const forShockSizeBeyond = 4;
const forShockSizeMost = 2;

/**
 * Makes the cleaned copies anew from the raw values: the monitored value with the largest additive-outlier
 * statistic |ω̂|·√(Σπ²), ω̂ = Σ π_j e_{s+j} / Σ π_j² (Chang, Tiao and Chen 1988), is moved back by ω̂, until
 * none passes 3.5 or three are moved. Starting from the raw values at every look lets a value that looked
 * wild alone come back once later ones bear it out.
 */
export function cleanOutliers(state: LookState, rule: CleaningRule): void {
  const { reference, start, count, order } = state;
  const { weights } = reference;
  const { residuals, cleaned, cleanedResiduals, shockValues, outliers } = state;
  for (let time = start; time < count; time++) {
    cleaned[time] = state.values[time];
    cleanedResiduals[time] = residuals[time];
    shockValues[time] = state.values[time];
  }
  state.outlierCount = 0;
  let forShockSize = 0;
  while (state.outlierCount < rule.most) {
    let largest = rule.beyond;
    let place = -1;
    let size = 0;
    for (let time = start; time < count; time++) {
      if (state.isGap[time]) continue;
      let sum = 0;
      let squares = 0;
      const reach = Math.min(order, count - 1 - time);
      for (let j = 0; j <= reach; j++) {
        sum += weights[j] * cleanedResiduals[time + j];
        squares += weights[j] * weights[j];
      }
      const ratio = Math.abs(sum) / Math.sqrt(squares);
      if (ratio > largest && !isListed(outliers, state.outlierCount, time)) {
        largest = ratio;
        place = time;
        size = sum / squares;
      }
    }
    if (place < 0) return;
    const alsoForShockSize =
      forShockSize === state.outlierCount && forShockSize < forShockSizeMost && largest > forShockSizeBeyond;
    cleaned[place] -= size;
    for (let j = 0; j <= order && place + j < count; j++) cleanedResiduals[place + j] -= size * weights[j];
    if (alsoForShockSize) {
      shockValues[place] -= size;
      forShockSize++;
    }
    outliers[state.outlierCount++] = place;
  }
}

function isListed(outliers: Int32Array, count: number, time: number): boolean {
  for (let i = 0; i < count; i++) if (outliers[i] === time) return true;
  return false;
}
