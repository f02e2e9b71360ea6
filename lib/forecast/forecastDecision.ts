import { backTestOf } from "./backTest.ts";
import { addOutcomes, type Calibration, calibrate, expectedWidening, noEvidence } from "./calibration.ts";
import type { Candidate, ScaledSeries } from "./candidateBank.ts";
import { candidateWeights } from "./candidateWeights.ts";
import { combineBank, pastWeights, type RolledBank } from "./combinedForecast.ts";
import type { BackTest } from "./forecast.ts";
import { backTestFrom, type ForecastChoice } from "./forecastChoice.ts";
import { naiveDoesBetter } from "./naiveFallback.ts";
import { horizonsCovered, type Origin } from "./rollingOrigins.ts";
import type { ShockTails } from "./shockTails.ts";

/** What the past says, asked for in two steps because calibration looks at what was fitted. */
export interface Decision {
  readonly weights: Float64Array;
  readonly record: (
    terms: number,
    tails: ShockTails,
  ) => {
    readonly calibration: Calibration;
    readonly backTest: BackTest;
    readonly naiveSeason: number | null;
  };
}

/** By what was decided earlier. */
export function standingDecision(standing: ForecastChoice): Decision {
  const { calibration, naiveSeason } = standing;
  return {
    weights: Float64Array.from(standing.weights),
    record: () => ({ calibration, backTest: backTestFrom(standing.backTest), naiveSeason }),
  };
}

/** Weights by the rolled losses; the record of the average, combined at each origin without its own outcomes. */
export function freshDecision(
  past: {
    readonly values: Float64Array;
    /** Values that are no gaps. */
    readonly observed: number;
    readonly scales: readonly ScaledSeries[];
    readonly candidates: readonly Candidate[];
    readonly origins: readonly Origin[];
    readonly season: number;
    readonly horizon: number;
  },
  rolled: RolledBank,
): Decision {
  const { values, observed, scales, candidates, origins, season, horizon } = past;
  const record = (terms: number, tails: ShockTails) => {
    const evidence = noEvidence();
    const combined = origins.map(({ count, steps }, o) => {
      const { weights, judged } = pastWeights(rolled, origins, o);
      const at = combineBank(rolled.banks[o], candidates, scales, weights, steps, judged);
      addOutcomes(evidence, at.spread, values, count, (values.length - count) / horizon);
      return at;
    });
    const expected = expectedWidening(observed, terms);
    const horizons = horizonsCovered(origins);
    const calibration = calibrate(evidence, expected, tails, horizons, observed);
    const test = backTestOf(values, combined, origins, season, horizon, calibration);
    const { backTest } = test;
    const naiveSeason = naiveDoesBetter(backTest.relativeError, test.naiveLead) ? test.naiveSeason : null;
    return { calibration, backTest, naiveSeason };
  };
  const weights = candidateWeights(rolled.losses, () => true, candidates.length, rolled.judged.power);
  return { weights, record };
}
