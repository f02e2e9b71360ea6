import { type PredictiveSpread, spreadScore } from "./predictiveSpread.ts";
import { studentFromNormal } from "./student.ts";

/** Scores of past outcomes under the spread that was forecast for them, each with the weight its evidence has. */
export interface CalibrationEvidence {
  readonly scores: number[];
  readonly weights: number[];
}

/**
 * How wide a range must be: turns the standard normal quantile of a level into deviations of the spread. Widening
 * factors at the 80 and the 95 % range, Student's degrees of freedom, and a factor for the shortness of the series.
 */
export interface Calibration {
  readonly narrow: number;
  readonly wide: number;
  readonly freedom: number;
  readonly shortness: number;
}

/** Adds the outcomes of one origin, whose weight of one is shared over its steps. */
export function addOutcomes(
  evidence: CalibrationEvidence,
  spread: PredictiveSpread,
  outcomes: ArrayLike<number>,
  from: number,
): void {
  const steps = spread.medians.length;
  for (let h = 0; h < steps; h++) {
    const outcome = outcomes[from + h];
    if (Number.isNaN(outcome)) continue;
    evidence.scores.push(Math.min(FARTHEST, Math.abs(spreadScore(spread, h, outcome))));
    evidence.weights.push(1 / steps);
  }
}

/** A past outcome counts for no more deviations than this: beyond it was a one-off, as in `dampOutliers`. */
const FARTHEST = 5;
/** Normal quantiles of the central 80 and 95 % ranges, at which the past is matched. */
const NARROW = 1.2815515655446004;
const WIDE = 1.959963984540054;
/** The model's own spread weighs as much as this many horizons of evidence. */
const PRIOR_HORIZONS = 0.25;

/**
 * Calibration from `horizons` independent horizons of evidence on a series of `count` values.
 *
 * At 80 and 95 % the factor is the quantile of past scores over the normal one, its square averaged with that of
 * `prior` (what the model should be wrong by for its estimated terms), whose weight is a quarter of a horizon. The
 * tails are Student's with count/4 degrees of freedom, at least 4, because the size of an error is itself estimated
 * and errors of real series have heavy tails; a short series is widened by 1 + 4/count for what was chosen on it
 * beside the counted terms (scale, differencing, drift). These last three numbers were set on the M1 and M4 sets of
 * the bench, for all of them together.
 */
export function calibrate(
  evidence: CalibrationEvidence,
  prior: number,
  horizons: number,
  count: number,
): Calibration {
  const order = [...evidence.scores.keys()].sort((a, b) => evidence.scores[a] - evidence.scores[b]);
  const total = evidence.weights.reduce((sum, weight) => sum + weight, 0);
  const blend = (probability: number, normal: number): number => {
    if (total === 0) return prior;
    let passed = 0;
    let found = 0;
    for (const i of order) {
      passed += evidence.weights[i];
      found = evidence.scores[i];
      if (passed >= probability * total) break;
    }
    const past = found / normal;
    return Math.sqrt((PRIOR_HORIZONS * prior * prior + horizons * past * past) / (PRIOR_HORIZONS + horizons));
  };
  const narrow = blend(0.8, NARROW);
  return {
    narrow,
    // A wider range must never be drawn in by luck in the past.
    wide: Math.max(narrow, blend(0.95, WIDE)),
    freedom: Math.max(4, count / 4),
    shortness: 1 + 4 / count,
  };
}

/** Deviations of the spread that belong to a standard normal quantile. Odd and increasing in `z`. */
export function calibratedReach({ narrow, wide, freedom, shortness }: Calibration, z: number): number {
  const share = Math.min(1, Math.max(0, (Math.abs(z) - NARROW) / (WIDE - NARROW)));
  return shortness * (narrow + share * (wide - narrow)) * studentFromNormal(z, freedom);
}

/** The standard normal quantile that belongs to so many deviations of the spread: the inverse, by halving. */
export function normalOfReach(calibration: Calibration, reach: number): number {
  let low = 0;
  let high = 40;
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2;
    if (calibratedReach(calibration, middle) < Math.abs(reach)) low = middle;
    else high = middle;
  }
  return reach < 0 ? -high : high;
}
