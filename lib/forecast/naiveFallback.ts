import type { AverageForecast } from "./averageForecast.ts";
import { addOutcomes, calibrate, noEvidence } from "./calibration.ts";
import type { Candidate } from "./candidateBank.ts";
import type { MemberFit } from "./memberFit.ts";
import { naiveForecast } from "./naiveForecast.ts";
import type { PredictiveSpread } from "./predictiveSpread.ts";
import { horizonsCovered, type Origin } from "./rollingOrigins.ts";
import { shockTails } from "./shockTails.ts";
import { workingScales } from "./workingScale.ts";

/** Standard errors that chance alone passes on this side once in twenty times. */
const BEYOND_CHANCE = 1.6448536269514722;

/**
 * Whether the record says that the naive forecast does better: smaller errors over all, by a difference between
 * origins that chance shows once in twenty times. Less is a tie, and the average stays.
 */
export function naiveDoesBetter(relativeError: number, naiveLead: number): boolean {
  return relativeError >= 1 && naiveLead >= BEYOND_CHANCE;
}

/**
 * The naive forecast in place of an average: the last value, or the last season where `season` is above 1, repeated.
 * Its errors add up like a random walk's (of seasons), with the size they had in the past, calibrated in the same way:
 * `judged` is the horizon that the origins were judged at.
 */
export function naiveInstead(
  average: AverageForecast,
  values: Float64Array,
  season: number,
  origins: readonly Origin[],
  judged: number,
): AverageForecast {
  const count = values.length;
  const observed = values.filter((value) => !Number.isNaN(value)).length;
  const horizon = average.spread.medians.length;
  const lag = Math.max(1, season);
  const stepOf = (h: number): number => Math.floor(h / lag) + 1;
  const changes = values
    .subarray(Math.min(lag, count))
    .map((value, t) => value - values[t])
    .filter((change) => !Number.isNaN(change));
  const power = changes.reduce((sum, change) => sum + change * change, 0);
  const innovationVariance = changes.length > 0 ? power / changes.length : 0;
  const [scale] = workingScales([-1]);
  const spreadAt = (from: number, steps: number): PredictiveSpread => ({
    medians: naiveForecast(values, from, season, steps),
    scales: [
      {
        scale,
        share: 1,
        deviations: Float64Array.from({ length: steps }, (_, h) => Math.sqrt(innovationVariance * stepOf(h))),
      },
    ],
  });
  const evidence = noEvidence();
  for (const { count: from, steps } of origins) {
    addOutcomes(evidence, spreadAt(from, steps), values, from, (count - from) / judged);
  }
  const preparation = {
    differences: [lag],
    season: 0,
    profile: "none",
    line: false,
    drifts: ["none"],
  } as const;
  const candidate: Candidate = { scale: 0, preparation, drift: "none" };
  const fit: MemberFit = {
    preparation,
    count,
    stages: [],
    levelProfile: undefined,
    meanProfile: undefined,
    model: { coefficients: new Float64Array(0), innovationVariance, meanOrder: 0 },
    wholeMean: 0,
    localMean: 0,
    slope: 0,
  };
  const spread = spreadAt(count, horizon);
  return {
    ...average,
    naive: true,
    candidates: [candidate],
    scales: [{ scale, values }],
    fits: [fit],
    paths: spread.medians,
    weights: Float64Array.of(1),
    shares: Float64Array.of(1),
    spread,
    calibration: calibrate(evidence, 1, shockTails(changes), horizonsCovered(origins), observed),
  };
}
