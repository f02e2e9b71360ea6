import { type Calibration, calibratedReach } from "./calibration.ts";
import type { CombinedForecast } from "./combinedForecast.ts";
import type { BackTest } from "./forecast.ts";
import { naiveForecast } from "./naiveForecast.ts";
import { spreadQuantile } from "./predictiveSpread.ts";
import { horizonsCovered, type Origin } from "./rollingOrigins.ts";
import { NARROW } from "./shockTails.ts";

/**
 * Rolling-origin record of the average: each past forecast was combined with weights that did not see its outcome.
 * The naive rival repeats the last value or, where that did better over all, the last season. `calibration`
 * is that of the forecast, for the coverage of the 80 % range. `naiveSeason` tells which rival it was, 0 for the last
 * value; `naiveLead` is how much smaller its mean absolute errors were, in standard errors of that difference.
 */
export function backTestOf(
  values: Float64Array,
  past: readonly CombinedForecast[],
  origins: readonly Origin[],
  season: number,
  horizon: number,
  calibration: Calibration,
): { readonly backTest: BackTest; readonly naiveSeason: number; readonly naiveLead: number } {
  const model = new Float64Array(horizon);
  const plain = new Float64Array(horizon);
  const seasonal = new Float64Array(horizon);
  const seen = new Float64Array(horizon);
  const reach = calibratedReach(calibration, NARROW);
  const leads = { plain: [] as number[], seasonal: [] as number[] };
  let inside = 0;
  let total = 0;
  for (let o = 0; o < origins.length; o++) {
    const { count, steps } = origins[o];
    const { spread } = past[o];
    const last = naiveForecast(values, count, 0, steps);
    const same = naiveForecast(values, count, season, steps);
    let [own, byLast, bySame, here] = [0, 0, 0, 0];
    for (let h = 0; h < steps; h++) {
      const actual = values[count + h];
      if (Number.isNaN(actual)) continue;
      const miss = Math.abs(actual - spread.medians[h]);
      const missLast = Math.abs(actual - last[h]);
      const missSame = Math.abs(actual - same[h]);
      model[h] += miss;
      plain[h] += missLast;
      seasonal[h] += missSame;
      own += miss;
      byLast += missLast;
      bySame += missSame;
      here++;
      seen[h]++;
      total++;
      if (actual >= spreadQuantile(spread, h, -reach) && actual <= spreadQuantile(spread, h, reach)) inside++;
    }
    if (here > 0) {
      leads.plain.push((own - byLast) / here);
      leads.seasonal.push((own - bySame) / here);
    }
  }
  const sum = (errors: Float64Array): number => errors.reduce((all, error) => all + error, 0);
  const naive = sum(seasonal) < sum(plain) ? seasonal : plain;
  const mean = (errors: Float64Array): Float64Array =>
    errors.map((error, h) => (seen[h] > 0 ? error / seen[h] : Number.NaN));
  const backTest = {
    origins: origins.length,
    meanAbsoluteError: mean(model),
    naiveMeanAbsoluteError: mean(naive),
    relativeError: total > 0 && sum(naive) > 0 ? sum(model) / sum(naive) : Number.NaN,
    coverage80: total > 0 ? inside / total : Number.NaN,
  };
  const better = naive === seasonal ? leads.seasonal : leads.plain;
  return {
    backTest,
    naiveSeason: naive === seasonal ? season : 0,
    naiveLead: standardised(better, horizonsCovered(origins)),
  };
}

/** Mean over its standard error, when overlapping origins hold only so many independent horizons; 0 when unknown. */
function standardised(leads: readonly number[], horizons: number): number {
  if (horizons <= 1) return 0;
  const mean = leads.reduce((sum, lead) => sum + lead, 0) / leads.length;
  const power = leads.reduce((sum, lead) => sum + (lead - mean) ** 2, 0) / leads.length;
  const error = Math.sqrt(power / (horizons - 1));
  return error > 0 ? mean / error : mean > 0 ? Number.POSITIVE_INFINITY : 0;
}
