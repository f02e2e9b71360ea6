import type { BurgWorkspace } from "../autoregression/burg.ts";
import { type DriftKind, type Preparation, preparations } from "./candidates.ts";
import { describedPath, type SeriesDescription } from "./describingModel.ts";
import { fitMember, forecastMember, type MemberFit } from "./memberFit.ts";
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

/** Forecasts of every candidate at one origin. */
export interface BankForecast {
  /** Row i (stride `horizon`) holds candidate i in units of the series; `NaN` where it could not be fitted. */
  readonly paths: Float64Array;
  /** The fit a candidate came from, `undefined` where none. */
  readonly fits: readonly (MemberFit | undefined)[];
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

/** Fits all candidates on the first `count` values and forecasts `horizon` steps. */
export function forecastBank(
  scales: readonly ScaledSeries[],
  candidates: readonly Candidate[],
  count: number,
  horizon: number,
  maxOrder: number,
  workspace: BurgWorkspace,
): BankForecast {
  const paths = new Float64Array(candidates.length * horizon).fill(Number.NaN);
  const fits: (MemberFit | undefined)[] = [];
  let fit: MemberFit | undefined;
  for (let i = 0; i < candidates.length; i++) {
    const { scale, preparation, drift, description } = candidates[i];
    const { back } = scales[scale].scale;
    if (description !== undefined) {
      fits.push(describedFit(description, count));
      const path = describedPath(description, scales[scale].values, count, horizon);
      for (let h = 0; h < horizon; h++) paths[i * horizon + h] = back(path[h]);
      continue;
    }
    const before = candidates[i - 1];
    // Drift kinds of one preparation stand side by side in the list and share a fit.
    if (before === undefined || before.scale !== scale || before.preparation !== preparation) {
      fit = fitMember(scales[scale].values, count, preparation, maxOrder, workspace);
    }
    fits.push(fit);
    if (fit === undefined) continue;
    forecastMember(fit, drift, horizon, paths, i * horizon);
    for (let h = 0; h < horizon; h++) paths[i * horizon + h] = back(paths[i * horizon + h]);
  }
  return { paths, fits };
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
