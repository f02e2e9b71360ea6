import { requireValues, requireWhole } from "../autoregression/checks.ts";

/**
 * Naive2, the yardstick of the M competitions: the last value of the seasonally adjusted series repeated, then
 * seasoned again (Makridakis, Spiliotis and Assimakopoulos 2020). The season is taken off by multiplicative classical
 * decomposition, and only when it passes the 90 % test |r_m| > 1.645 √((1 + 2 Σ_{i<m} r_i²)/n) with three seasons of
 * data; values that are not all positive have no multiplicative season and pass for unseasonal. `season` 1 is the plain
 * naive forecast.
 *
 * Throws for gaps, a season or horizon below 1.
 *
 * @example naive2([1, 2, 3], 1, 2) // [3, 3]
 */
export function naive2(values: ArrayLike<number>, season: number, horizon: number): Float64Array {
  requireValues("naive2", "values", values, "no-gaps");
  requireWhole("naive2", "season", season, 1);
  requireWhole("naive2", "horizon", horizon, 1);
  const count = values.length;
  if (count === 0) throw new RangeError("naive2 needs at least one value, got 0");
  const indexes = isSeasonal(values, season)
    ? classicalIndexes(values, season)
    : new Float64Array(season).fill(1);
  const last = values[count - 1] / indexes[(count - 1) % season];
  return Float64Array.from({ length: horizon }, (_, h) => last * indexes[(count + h) % season]);
}

/** The 90 % test of the autocorrelation at the season, its error by Bartlett's formula. */
function isSeasonal(values: ArrayLike<number>, season: number): boolean {
  const count = values.length;
  if (season < 2 || count < 3 * season) return false;
  for (let t = 0; t < count; t++) if (values[t] <= 0) return false;
  let mean = 0;
  for (let t = 0; t < count; t++) mean += values[t] / count;
  const products = (lag: number): number => {
    let sum = 0;
    for (let t = lag; t < count; t++) sum += (values[t] - mean) * (values[t - lag] - mean);
    return sum;
  };
  const power = products(0);
  if (power === 0) return false;
  let squares = 0;
  for (let lag = 1; lag < season; lag++) squares += (products(lag) / power) ** 2;
  return Math.abs(products(season) / power) > 1.645 * Math.sqrt((1 + 2 * squares) / count);
}

/** Seasonal indexes of multiplicative classical decomposition (R's `decompose`), averaging 1. */
function classicalIndexes(values: ArrayLike<number>, season: number): Float64Array {
  const half = season >> 1;
  const end = season % 2 === 0 ? 0.5 : 1;
  const sums = new Float64Array(season);
  const seen = new Float64Array(season);
  for (let t = half; t + half < values.length; t++) {
    let trend = end * (values[t - half] + values[t + half]);
    for (let j = 1 - half; j < half; j++) trend += values[t + j];
    sums[t % season] += (values[t] * season) / trend;
    seen[t % season]++;
  }
  const means = sums.map((sum, s) => sum / seen[s]);
  const level = means.reduce((sum, mean) => sum + mean, 0) / season;
  return means.map((mean) => mean / level);
}
