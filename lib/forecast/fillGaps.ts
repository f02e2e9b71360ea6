import type { BurgWorkspace } from "../autoregression/burg.ts";
import { orderAverage } from "./orderAverage.ts";

/**
 * Fills gaps on the working scale so that recursions over every value can run: first straight lines between the
 * neighbours, carrying the season's own shape when there is one (the average of the observed values a whole number
 * of seasons away, corrected to the line), then the conditional expectation under an autoregression of the
 * differences fitted to that (the values that make the sum of squared shocks least, by Gauss–Seidel sweeps).
 *
 * Leading and trailing gaps are not here: callers trim the first and forecast over the second. Filled values are
 * for fitting only; errors are never scored on them. Returns a new array; the input when it has no gap.
 */
export function fillGaps(values: Float64Array, season: number, workspace: BurgWorkspace): Float64Array {
  const gaps: number[] = [];
  for (let t = 0; t < values.length; t++) if (Number.isNaN(values[t])) gaps.push(t);
  if (gaps.length === 0) return values;
  const filled = interpolate(values);
  if (season > 1) addSeason(values, filled, gaps, season);
  settle(filled, gaps, workspace);
  return filled;
}

/** Straight lines between observed neighbours; ends are carried. */
function interpolate(values: Float64Array): Float64Array {
  const filled = values.slice();
  let last = -1;
  for (let t = 0; t < values.length; t++) {
    if (Number.isNaN(values[t])) continue;
    const from = last < 0 ? values[t] : values[last];
    for (let s = last + 1; s < t; s++) {
      filled[s] = from + (last < 0 ? 0 : ((values[t] - from) * (s - last)) / (t - last));
    }
    last = t;
  }
  for (let s = last + 1; s < values.length; s++) filled[s] = values[last];
  return filled;
}

/** Bends the lines by how far the same season usually stands from the line between the gap's own neighbours. */
function addSeason(
  values: Float64Array,
  filled: Float64Array,
  gaps: readonly number[],
  season: number,
): void {
  const count = values.length;
  const line = filled.slice();
  for (const t of gaps) {
    let before = t;
    while (before >= 0 && Number.isNaN(values[before])) before--;
    let after = t;
    while (after < count && Number.isNaN(values[after])) after++;
    if (before < 0 || after >= count) continue;
    const share = (t - before) / (after - before);
    let bend = 0;
    let found = 0;
    for (let shift = -3; shift <= 3; shift++) {
      const move = shift * season;
      const here = values[t + move];
      const left = values[before + move];
      const right = values[after + move];
      if (shift === 0 || !Number.isFinite(here + left + right)) continue;
      bend += here - (left + share * (right - left));
      found++;
    }
    if (found > 0) filled[t] = line[t] + bend / found;
  }
}

/** Gauss–Seidel on the sum of squared shocks of an autoregression of the differences. */
function settle(filled: Float64Array, gaps: readonly number[], workspace: BurgWorkspace): void {
  const count = filled.length;
  const steps = new Float64Array(count - 1);
  let mean = 0;
  for (let t = 1; t < count; t++) mean += (filled[t] - filled[t - 1]) / (count - 1);
  for (let t = 1; t < count; t++) steps[t - 1] = filled[t] - filled[t - 1] - mean;
  const longest = Math.min(workspace.maxOrder, Math.floor(steps.length / 4), 26);
  const { coefficients } = orderAverage(steps, longest, 1, workspace);
  // Filter of the levels: a(B) = (1 − Σ φ_j B^j)(1 − B).
  const reach = coefficients.length + 1;
  const filter = new Float64Array(reach + 1);
  filter[0] = 1;
  for (let j = 0; j < coefficients.length; j++) {
    filter[j + 1] -= coefficients[j];
  }
  for (let j = reach; j > 0; j--) filter[j] -= filter[j - 1];
  let drift = 1;
  for (let j = 0; j < coefficients.length; j++) drift -= coefficients[j];
  drift *= mean;
  for (let sweep = 0; sweep < 20; sweep++) {
    for (const t of gaps) {
      let gradient = 0;
      let curvature = 0;
      for (let j = 0; j <= reach; j++) {
        const s = t + j;
        if (s < reach || s >= count) continue;
        let shock = -drift;
        for (let i = 0; i <= reach; i++) shock += filter[i] * filled[s - i];
        gradient += filter[j] * shock;
        curvature += filter[j] * filter[j];
      }
      if (curvature > 0) filled[t] -= gradient / curvature;
    }
  }
}
