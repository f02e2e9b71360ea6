import type { Calibration } from "./calibration.ts";
import { type Candidate, fitBank, forecastBank, listCandidates, type ScaledSeries } from "./candidateBank.ts";
import { judgedBy } from "./candidateWeights.ts";
import { combineBank, rollBank } from "./combinedForecast.ts";
import { dampOutliers } from "./dampOutliers.ts";
import type { SeriesDescription } from "./describingModel.ts";
import { fillGaps } from "./fillGaps.ts";
import type { BackTest } from "./forecast.ts";
import { type ForecastChoice, storedBackTest } from "./forecastChoice.ts";
import { freshDecision, standingDecision } from "./forecastDecision.ts";
import type { MemberFit } from "./memberFit.ts";
import { naiveInstead } from "./naiveFallback.ts";
import { orderWorkspace } from "./orderAverage.ts";
import type { PredictiveSpread } from "./predictiveSpread.ts";
import { rollingOrigins } from "./rollingOrigins.ts";
import { memberShocks, NORMAL_TAILS, type ShockTails, shockTails } from "./shockTails.ts";
import { workingScales } from "./workingScale.ts";

/** The average of the whole bank at the end of the series, with what the past says about it. */
export interface AverageForecast {
  readonly candidates: readonly Candidate[];
  readonly scales: readonly ScaledSeries[];
  readonly fits: readonly (MemberFit | undefined)[];
  /** Row i (stride horizon) holds candidate i's own forecast. */
  readonly paths: Float64Array;
  readonly weights: Float64Array;
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

/** An average with what was decided for it, for later forecasts to go by; the describing model apart. */
export interface DecidedForecast {
  readonly average: AverageForecast;
  readonly choice: Omit<ForecastChoice, "version" | "length" | "describing">;
}

/** Longest lag looked at: a season and some more, a third of the series, and 200 in any case. */
function longestLag(count: number, seasons: readonly number[]): number {
  const season = seasons.length > 0 ? seasons[seasons.length - 1] : 0;
  return Math.max(1, Math.min(200, Math.floor(count / 3), Math.max(60, season + 32)));
}

/** Steps ahead judged at a past origin at least: the next value alone of a few origins is mostly chance. */
const LEAST_JUDGED = 4;
/** Candidates that carry less than this share of all weight move no digit that is told, and are not fitted. */
const LEAST_WEIGHT = 1e-4;

/**
 * Forecasts `values` (gaps allowed inside, observed at both ends) by the average of all candidates: weighed and
 * calibrated by the past, or as a standing choice says, which must fit the series (`choiceFits`).
 */
export function averageForecast(
  values: Float64Array,
  seasons: readonly number[],
  horizon: number,
  description: SeriesDescription | undefined,
  standing?: ForecastChoice,
): DecidedForecast {
  const count = values.length;
  const maxOrder = longestLag(count, seasons);
  const workspace = orderWorkspace(count, maxOrder);
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
  const judged = Math.max(horizon, LEAST_JUDGED);
  const origins = rollingOrigins(count, judged, least);
  const decision = standing
    ? standingDecision(standing)
    : freshDecision(
        { values, observed: observed.length, scales, candidates, origins, season, horizon: judged },
        rollBank(values, scales, candidates, origins, judged, maxOrder, workspace),
      );
  const weights = leading(decision.weights);
  const wanted = (i: number) => weights[i] > 0;
  const fitted = fitBank(scales, candidates, count, horizon, maxOrder, workspace, wanted);
  fitted.fits.forEach((fit, i) => {
    if (fit === undefined) weights[i] = 0;
  });
  const bank = forecastBank(scales, candidates, fitted, count, horizon);
  const combined = combineBank(bank, candidates, scales, weights, horizon, judgedBy(origins));
  const { calibration, backTest, naiveSeason } = decision.record(
    meanTerms(bank.fits, combined.shares),
    leadersTails(bank.fits, combined.shares),
  );
  const average: AverageForecast = {
    candidates,
    scales,
    fits: bank.fits,
    paths: bank.paths,
    weights,
    shares: combined.shares,
    spread: combined.spread,
    calibration,
    backTest,
    naive: false,
    outliers: [...outliers].sort((a, b) => a - b),
    steps: [...steps].sort((a, b) => a - b),
  };
  const choice = {
    scales: scales.map(({ scale }) => scale.name),
    seasons,
    horizon,
    weights: Array.from(weights, (weight) => Number(weight.toPrecision(6))),
    calibration,
    backTest: storedBackTest(backTest),
    naiveSeason,
  };
  return {
    average: naiveSeason === null ? average : naiveInstead(average, values, naiveSeason, origins, judged),
    choice,
  };
}

/** Weights without the small ones, which change nothing that is told. */
function leading(weights: Float64Array): Float64Array {
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  return weights.map((weight) => (weight < LEAST_WEIGHT * total ? 0 : weight));
}

/** Number of terms estimated, averaged over the candidates that carry the forecast. */
function meanTerms(fits: readonly (MemberFit | undefined)[], shares: Float64Array): number {
  let terms = 1;
  for (let i = 0; i < fits.length; i++) terms += shares[i] * (1 + (fits[i]?.model.meanOrder ?? 0));
  return terms;
}

/** Tails of the shocks of the candidate with the largest share; the describing model leaves no values to look at. */
function leadersTails(fits: readonly (MemberFit | undefined)[], shares: Float64Array): ShockTails {
  let leader: MemberFit | undefined;
  let most = 0;
  fits.forEach((fit, i) => {
    if (fit === undefined || fit.stages.length === 0 || shares[i] <= most) return;
    leader = fit;
    most = shares[i];
  });
  return leader === undefined ? NORMAL_TAILS : shockTails(memberShocks(leader));
}
