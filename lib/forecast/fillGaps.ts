import { type OrderWorkspace, orderAverage } from "./orderAverage.ts";
import { levelProfile } from "./seasonalProfile.ts";

/**
 * Fills gaps on the working scale so that recursions over every value can run: first straight lines between the
 * neighbours, carrying the season's own shape when there is one (the average of the observed values a whole number
 * of seasons away, corrected to the line), then the conditional expectation under an autoregression of the
 * differences, season taken off, fitted to that (the values that make the sum of squared shocks least, by Gauss–Seidel sweeps).
 *
 * Leading and trailing gaps are not here: callers trim the first and forecast over the second. Filled values are
 * for fitting only; errors are never scored on them. Returns a new array; the input when it has no gap.
 */
export function fillGaps(values: Float64Array, season: number, workspace: OrderWorkspace): Float64Array {
  const gaps: number[] = [];
  for (let t = 0; t < values.length; t++) if (Number.isNaN(values[t])) gaps.push(t);
  if (gaps.length === 0) return values;
  const filled = interpolate(values);
  if (season > 1) addSeason(values, filled, gaps, season);
  // The autoregression bends lines to the neighbours, not to a season, which must therefore stand aside.
  const profile =
    season > 1 && values.length >= 3 * season
      ? levelProfile(filled, season, values.length)
      : new Float64Array(1);
  for (let t = 0; t < filled.length; t++) filled[t] -= profile[t % profile.length];
  settle(filled, gaps, workspace);
  for (let t = 0; t < filled.length; t++) filled[t] += profile[t % profile.length];
  for (let t = 0; t < filled.length; t++) if (!Number.isNaN(values[t])) filled[t] = values[t];
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

/** Sweeps over the gaps; neighbouring gaps settle within a few. */
const SWEEPS = 10;

/** Gauss–Seidel on the sum of squared errors, forward and backward, of an autoregression of the differences. */
function settle(filled: Float64Array, gaps: readonly number[], workspace: OrderWorkspace): void {
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
  // Both directions of time, as in Burg's method: near the start only the backward errors weigh near values fully.
  const directions = [1, -1] as const;
  for (let sweep = 0; sweep < SWEEPS; sweep++) {
    for (const t of gaps) {
      let gradient = 0;
      let curvature = 0;
      for (const direction of directions) {
        for (let j = 0; j <= reach; j++) {
          const s = t + direction * j;
          const oldest = s - direction * reach;
          if (Math.min(s, oldest) < 0 || Math.max(s, oldest) >= count) continue;
          let shock = -direction * drift;
          for (let i = 0; i <= reach; i++) shock += filter[i] * filled[s - direction * i];
          gradient += filter[j] * shock;
          curvature += filter[j] * filter[j];
        }
      }
      if (curvature > 0) filled[t] -= gradient / curvature;
    }
  }
}
