import { tabulate } from "../numeric/tabulate.ts";
import {
  type BankForecast,
  type Candidate,
  type FittedBank,
  fitBank,
  forecastBank,
  type ScaledSeries,
} from "./candidateBank.ts";
import { candidateWeights, type Judged, judgedBy, weightsAhead } from "./candidateWeights.ts";
import type { MemberFit } from "./memberFit.ts";
import { mixtureDeviation } from "./mixtureDeviation.ts";
import type { OrderWorkspace } from "./orderAverage.ts";
import type { PredictiveSpread, ScaleSpread } from "./predictiveSpread.ts";
import { type Origin, shareOutcomes } from "./rollingOrigins.ts";
import { weightedMiddle } from "./weightedMiddle.ts";
import type { WorkingScale } from "./workingScale.ts";

/** The average at one origin: medians with their uncalibrated spread, and the part each candidate had. */
export interface CombinedForecast {
  readonly spread: PredictiveSpread;
  /** Mean over horizon steps of each candidate's share in the average; sums to 1. */
  readonly shares: Float64Array;
}

/** Everything the average needs to know of the past: bank forecasts at each origin and what they lost. */
export interface RolledBank {
  readonly banks: readonly BankForecast[];
  /** By working scale, then origin, then candidate: mean squared error on that scale. */
  readonly losses: readonly (readonly Float64Array[])[];
  readonly judged: Judged;
}

/** Makes every candidate's forecast at every origin and scores it on the values that were observed. */
export function rollBank(
  values: Float64Array,
  scales: readonly ScaledSeries[],
  candidates: readonly Candidate[],
  origins: readonly Origin[],
  horizon: number,
  maxOrder: number,
  workspace: OrderWorkspace,
): RolledBank {
  const banks: BankForecast[] = [];
  const losses: Float64Array[][] = scales.map(() => []);
  let lowest = Number.POSITIVE_INFINITY;
  for (const value of values) if (value < lowest) lowest = value;
  let fitted: FittedBank = { fits: [], variances: [] };
  origins.forEach(({ count, steps, fitted: known }, o) => {
    if (o === 0 || origins[o - 1].fitted !== known) {
      fitted = fitBank(scales, candidates, known, horizon, maxOrder, workspace);
    }
    const bank = forecastBank(scales, candidates, fitted, count, steps);
    const optimism = candidates.map(({ description }, i) =>
      description === undefined ? 1 : describedOptimism(bank.fits[i], count),
    );
    scales.forEach(({ scale }, index) => {
      losses[index].push(lossesOn(scale, lowest, values, bank, optimism, count, steps));
    });
    banks.push(bank);
  });
  return { banks, losses, judged: judgedBy(origins) };
}

/** A path counts for no less than this part of the lowest value: it may have no logarithm at all. */
const LOWEST_PART = 0.1;

/** Mean squared error of every path of a bank as one scale sees it; `NaN` where there is no path or no outcome. */
function lossesOn(
  { name, forward }: WorkingScale,
  lowest: number,
  values: Float64Array,
  bank: BankForecast,
  optimism: readonly number[],
  from: number,
  steps: number,
): Float64Array {
  const floor = name === "raw" ? Number.NEGATIVE_INFINITY : forward(LOWEST_PART * lowest);
  const actuals = tabulate(steps, (h) => forward(values[from + h]));
  return tabulate(bank.fits.length, (i) => {
    if (bank.fits[i] === undefined) return Number.NaN;
    let sum = 0;
    let seen = 0;
    for (let h = 0; h < steps; h++) {
      const actual = actuals[h];
      if (Number.isNaN(actual)) continue;
      const path = forward(bank.paths[i * steps + h]);
      const error = actual - (Number.isNaN(path) ? floor : Math.max(path, floor));
      sum += (error * error) / (h + 1);
      seen++;
    }
    return seen > 0 ? Math.min((optimism[i] * sum) / seen, Number.MAX_VALUE / 1e6) : Number.NaN;
  });
}

/**
 * The describing model is fitted once, to the whole series, and so has seen the outcomes it is scored on. The square of
 * the ratio of Akaike's final prediction error (1970), (n + k)/(n − k), puts its squared errors on the footing of the
 * refitted ones: Akaike's is that of squared errors one step ahead, and an estimated term errs in every step again, so
 * that deviations are taken to grow by it as in `expectedWidening`.
 */
function describedOptimism(fit: MemberFit | undefined, count: number): number {
  const terms = (fit?.model.meanOrder ?? 0) + 1;
  return ((count + terms) / Math.max(1, count - terms)) ** 2;
}

/**
 * Weights of the candidates at a past origin that is to be judged, and what they hold for: by the losses at origins
 * that share none of its outcomes, as if those had not been seen yet, with the power that the rest of the evidence
 * allows.
 */
export function pastWeights(
  { banks, losses }: RolledBank,
  origins: readonly Origin[],
  o: number,
): { readonly weights: Float64Array; readonly judged: Judged } {
  const { fits } = banks[o];
  const apart = (_: unknown, other: number): boolean => !shareOutcomes(origins[other], origins[o]);
  const judged = judgedBy(origins.filter(apart));
  const others = losses.map((byOrigin) => byOrigin.filter(apart));
  const usable = (i: number) => fits[i] !== undefined;
  return { weights: candidateWeights(others, usable, fits.length, judged.power), judged };
}

/** Combines one bank by weights, which hold as far as was judged: the weighted middle half at each step. */
export function combineBank(
  bank: BankForecast,
  candidates: readonly Candidate[],
  scales: readonly ScaledSeries[],
  weights: Float64Array,
  horizon: number,
  judged: Judged,
): CombinedForecast {
  const count = candidates.length;
  const column = new Float64Array(count);
  const ahead = new Float64Array(count);
  const order = new Int32Array(count);
  const stepShares = new Float64Array(count);
  const shares = new Float64Array(count);
  const medians = new Float64Array(horizon);
  for (let h = 0; h < horizon; h++) {
    for (let i = 0; i < count; i++) column[i] = weights[i] > 0 ? bank.paths[i * horizon + h] : 0;
    weightsAhead(weights, bank.variances, h, judged, ahead);
    medians[h] = weightedMiddle(column, ahead, order, stepShares);
    for (let i = 0; i < count; i++) shares[i] += stepShares[i] / horizon;
  }
  return {
    spread: { medians, scales: scaleSpreads(bank, candidates, scales, weights, shares, medians) },
    shares,
  };
}

/** Spread of each working scale: that of the mixture of its candidates about the average, seen on the scale. */
function scaleSpreads(
  bank: BankForecast,
  candidates: readonly Candidate[],
  scales: readonly ScaledSeries[],
  weights: Float64Array,
  shares: Float64Array,
  medians: Float64Array,
): ScaleSpread[] {
  const horizon = medians.length;
  return scales.map(({ scale }, index) => {
    const members: number[] = [];
    for (let i = 0; i < candidates.length; i++) {
      if (candidates[i].scale === index && weights[i] > 0) members.push(i);
    }
    const ownWeights = Float64Array.from(members, (i) => weights[i]);
    const share = members.reduce((sum, i) => sum + shares[i], 0);
    const order = new Int32Array(members.length);
    const precisions = new Float64Array(members.length);
    const distances = new Float64Array(members.length);
    const deviations = new Float64Array(horizon);
    for (let h = 0; h < horizon && members.length > 0; h++) {
      const anchor = scale.forward(medians[h]);
      for (let m = 0; m < members.length; m++) {
        precisions[m] = 1 / bank.variances[members[m]][h];
        distances[m] = Math.abs(scale.forward(bank.paths[members[m] * horizon + h]) - anchor);
      }
      deviations[h] = mixtureDeviation(precisions, distances, ownWeights, order);
    }
    return { scale, share, deviations };
  });
}
