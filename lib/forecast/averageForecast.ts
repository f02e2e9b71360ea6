import { backTestOf } from "./backTest.ts";
import { addOutcomes, type Calibration, type CalibrationEvidence, calibrate } from "./calibration.ts";
import { type Candidate, fitBank, forecastBank, listCandidates, type ScaledSeries } from "./candidateBank.ts";
import { type CombinedForecast, combineBank, forecastWorkspace, rollBank } from "./combinedForecast.ts";
import { dampOutliers } from "./dampOutliers.ts";
import type { SeriesDescription } from "./describingModel.ts";
import { fillGaps } from "./fillGaps.ts";
import type { BackTest } from "./forecast.ts";
import type { MemberFit } from "./memberFit.ts";
import { naiveDoesBetter, naiveInstead } from "./naiveFallback.ts";
import type { PredictiveSpread } from "./predictiveSpread.ts";
import { horizonsCovered, rollingOrigins } from "./rollingOrigins.ts";
import { workingScales } from "./workingScale.ts";

/** The average of the whole bank at the end of the series, with what the past says about it. */
export interface AverageForecast {
  readonly candidates: readonly Candidate[];
  readonly scales: readonly ScaledSeries[];
  readonly fits: readonly (MemberFit | undefined)[];
  /** Row i (stride horizon) holds candidate i's own forecast. */
  readonly paths: Float64Array;
  readonly shares: Float64Array;
  readonly spread: PredictiveSpread;
  readonly calibration: Calibration;
  /** Record of the average, whether or not it was used. */
  readonly backTest: BackTest;
  /** Whether the naive forecast stands in for the average, which did no better in the past. */
  readonly naive: boolean;
  readonly outliers: readonly number[];
  readonly steps: readonly number[];
}

/** Longest lag looked at: a season and some more, a third of the series, and 200 in any case. */
function longestLag(count: number, seasons: readonly number[]): number {
  const season = seasons.length > 0 ? seasons[seasons.length - 1] : 0;
  return Math.max(1, Math.min(200, Math.floor(count / 3), Math.max(60, season + 32)));
}

/**
 * Forecasts `values` (gaps allowed inside, observed at both ends) by the average of all candidates.
 */
export function averageForecast(
  values: Float64Array,
  seasons: readonly number[],
  horizon: number,
  description: SeriesDescription | undefined,
): AverageForecast {
  const count = values.length;
  const maxOrder = longestLag(count, seasons);
  const workspace = forecastWorkspace(count, maxOrder);
  const season = seasons.length > 0 ? seasons[0] : 0;
  const observed = values.filter((value) => !Number.isNaN(value));
  const outliers = new Set<number>();
  const steps = new Set<number>();
  // Without a season the bank is small and growth is most of what there is to get right.
  const scales: ScaledSeries[] = workingScales(observed, seasons.length === 0).map((scale) => {
    const filled = fillGaps(values.map(scale.forward), season, workspace);
    const damped = dampOutliers(filled, season, workspace);
    for (const t of damped.outliers) outliers.add(t);
    for (const t of damped.steps) steps.add(t);
    return { scale, values: damped.values };
  });
  const candidates = listCandidates(scales, seasons, description);
  // Two seasons and one value are the least a profile can be fitted to; short series need every origin they can have.
  const least = Math.max(8, seasons.length > 0 ? 2 * season + 1 : 0);
  const origins = rollingOrigins(count, horizon, least);
  const rolled = rollBank(values, scales, candidates, origins, horizon, maxOrder, workspace);
  const fitted = fitBank(scales, candidates, count, horizon, maxOrder, workspace);
  const bank = forecastBank(scales, candidates, fitted, count, horizon);
  const combined = combineBank(bank, candidates, scales, rolled, -1, horizon);
  const evidence: CalibrationEvidence = { scores: [], weights: [] };
  const past: CombinedForecast[] = [];
  for (let o = 0; o < origins.length; o++) {
    const origin = origins[o];
    const at = combineBank(rolled.banks[o], candidates, scales, rolled, o, origin.steps);
    past.push(at);
    addOutcomes(evidence, at.spread, values, origin.count);
  }
  const terms = meanTerms(bank.fits, combined.shares);
  const prior = Math.sqrt((observed.length + terms) / Math.max(1, observed.length - terms));
  const calibration = calibrate(evidence, prior, horizonsCovered(origins, count), observed.length);
  const { backTest, naiveSeason } = backTestOf(values, past, origins, season, horizon, calibration);
  const average: AverageForecast = {
    candidates,
    scales,
    fits: bank.fits,
    paths: bank.paths,
    shares: combined.shares,
    spread: combined.spread,
    calibration,
    backTest,
    naive: false,
    outliers: [...outliers].sort((a, b) => a - b),
    steps: [...steps].sort((a, b) => a - b),
  };
  return naiveDoesBetter(backTest.relativeError, horizonsCovered(origins, count))
    ? naiveInstead(average, values, naiveSeason, origins)
    : average;
}

/** Number of terms estimated, averaged over the candidates that carry the forecast. */
function meanTerms(fits: readonly (MemberFit | undefined)[], shares: Float64Array): number {
  let terms = 1;
  for (let i = 0; i < fits.length; i++) terms += shares[i] * (1 + (fits[i]?.model.meanOrder ?? 0));
  return terms;
}
