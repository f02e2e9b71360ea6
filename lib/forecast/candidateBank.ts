import { type DriftKind, type Preparation, preparations } from "./candidates.ts";
import { describedPath, type SeriesDescription } from "./describingModel.ts";
import { errorVariances, fitMember, forecastMember, type MemberFit } from "./memberFit.ts";
import type { OrderWorkspace } from "./orderAverage.ts";
import type { WorkingScale } from "./workingScale.ts";

/** A series on one working scale, gaps filled and outliers damped. */
export interface ScaledSeries {
  readonly scale: WorkingScale;
  readonly values: Float64Array;
}

/** One member of the average. */
export interface Candidate {
  /** Index of its working scale. */
  readonly scale: number;
  readonly preparation: Preparation;
  readonly drift: DriftKind;
  /** The describing model is a member like any other, with the coefficients of its exact fit. */
  readonly description?: SeriesDescription;
}

/** The describing model needs no preparation of its own: its terms are in its fit. */
const DESCRIBED: Preparation = {
  differences: [],
  season: 0,
  profile: "none",
  line: false,
  drifts: ["whole"],
};

/** Every candidate fitted to the first values of the series; `undefined` where one could not be. */
export interface FittedBank {
  readonly fits: readonly (MemberFit | undefined)[];
  /** Error variance of each candidate on its scale, by step up to the horizon; empty where there is no fit. */
  readonly variances: readonly Float64Array[];
}

/** Forecasts of every candidate at one origin. */
export interface BankForecast extends FittedBank {
  /** Row i (stride `horizon`) holds candidate i in units of the series; `NaN` where it could not be fitted. */
  readonly paths: Float64Array;
}

/** Every scale with every preparation with every drift, and the describing model. */
export function listCandidates(
  scales: readonly ScaledSeries[],
  seasons: readonly number[],
  description: SeriesDescription | undefined,
): Candidate[] {
  const bank: Candidate[] = [];
  for (let scale = 0; scale < scales.length; scale++) {
    for (const preparation of preparations(seasons)) {
      for (const drift of preparation.drifts) bank.push({ scale, preparation, drift });
    }
  }
  const scale = scales.findIndex((one) => one.scale.name === description?.scale);
  if (description !== undefined && scale >= 0) {
    bank.push({ scale, preparation: DESCRIBED, drift: "whole", description });
  }
  return bank;
}

/**
 * Fits the wanted candidates (all unless told) on the first `count` values, for forecasts of up to `horizon` steps.
 */
export function fitBank(
  scales: readonly ScaledSeries[],
  candidates: readonly Candidate[],
  count: number,
  horizon: number,
  maxOrder: number,
  workspace: OrderWorkspace,
  wanted: (candidate: number) => boolean = () => true,
): FittedBank {
  // Drift kinds of one preparation stand side by side in the list and share a fit.
  let shared: { scale: number; preparation: Preparation; fit: MemberFit | undefined } | undefined;
  const fits = candidates.map(({ scale, preparation, description }, i) => {
    if (!wanted(i)) return undefined;
    if (description !== undefined) return describedFit(description, count);
    if (shared?.scale !== scale || shared.preparation !== preparation) {
      const fit = fitMember(scales[scale].values, count, preparation, maxOrder, workspace);
      shared = { scale, preparation, fit };
    }
    return shared.fit;
  });
  const variances = fits.map((fit, i) =>
    fit === undefined ? new Float64Array(0) : errorVariances(fit, candidates[i].drift, horizon),
  );
  return { fits, variances };
}

/** Forecasts `horizon` steps after the first `count` values, which may be more than the bank was fitted to. */
export function forecastBank(
  scales: readonly ScaledSeries[],
  candidates: readonly Candidate[],
  { fits, variances }: FittedBank,
  count: number,
  horizon: number,
): BankForecast {
  const paths = new Float64Array(candidates.length * horizon).fill(Number.NaN);
  for (let i = 0; i < candidates.length; i++) {
    const { scale, drift, description } = candidates[i];
    const { values } = scales[scale];
    const { back } = scales[scale].scale;
    const fit = fits[i];
    if (description !== undefined) paths.set(describedPath(description, values, count, horizon), i * horizon);
    else if (fit !== undefined) forecastMember(fit, drift, count, horizon, paths, i * horizon);
    else continue;
    for (let h = 0; h < horizon; h++) paths[i * horizon + h] = back(paths[i * horizon + h]);
  }
  return { paths, fits, variances };
}

/** The exact fit in the form that the spread of the average reads. */
function describedFit({ fit }: SeriesDescription, count: number): MemberFit {
  const { coefficients, innovationVariance, order } = fit;
  return {
    preparation: DESCRIBED,
    count,
    stages: [],
    levelProfile: undefined,
    meanProfile: undefined,
    model: {
      coefficients,
      innovationVariance,
      meanOrder: order + (fit.regression?.coefficients.length ?? 1),
    },
    wholeMean: fit.mean,
    localMean: fit.mean,
    slope: 0,
  };
}
