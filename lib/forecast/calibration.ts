import { type PredictiveSpread, spreadScore } from "./predictiveSpread.ts";
import { NARROW, type ShockTails, WIDE } from "./shockTails.ts";
import { studentFromNormal } from "./student.ts";

/** Scores of past outcomes under the spread that was forecast for them, each with the weight its evidence has. */
export interface CalibrationEvidence {
  readonly scores: number[];
  readonly weights: number[];
  /** Logarithm of the mean score of each origin, and the origin's weight. */
  readonly sizes: number[];
  readonly originWeights: number[];
}

/**
 * How wide a range must be: turns the standard normal quantile of a level into deviations of the spread. Widening
 * factors at the 80 and the 95 % range, and Student's degrees of freedom.
 */
export interface Calibration {
  readonly narrow: number;
  readonly wide: number;
  readonly freedom: number;
}

export function noEvidence(): CalibrationEvidence {
  return { scores: [], weights: [], sizes: [], originWeights: [] };
}

/**
 * Adds the outcomes of one origin that lies `age` horizons back. Its weight halves with every horizon of age, for
 * errors grow and shrink with the times, and is shared over its steps.
 */
export function addOutcomes(
  evidence: CalibrationEvidence,
  spread: PredictiveSpread,
  outcomes: ArrayLike<number>,
  from: number,
  age: number,
): void {
  const steps = spread.medians.length;
  const weight = 0.5 ** age;
  let sum = 0;
  let seen = 0;
  for (let h = 0; h < steps; h++) {
    const outcome = outcomes[from + h];
    if (Number.isNaN(outcome)) continue;
    const score = Math.min(FARTHEST, Math.abs(spreadScore(spread, h, outcome)));
    evidence.scores.push(score);
    evidence.weights.push(weight / steps);
    sum += score;
    seen++;
  }
  if (seen === 0) return;
  evidence.sizes.push(Math.log(Math.max(NEAREST, sum / seen)));
  evidence.originWeights.push(weight);
}

/** A past outcome counts for no more deviations than this: beyond it was a one-off, as in `dampOutliers`. */
const FARTHEST = 5;
/** Nor is the past believed to have been better than this part of what was forecast. */
const NEAREST = 0.05;
/**
 * The average errs less than the spread of the mixture says, which counts the distance between candidates as error,
 * although errors that differ cancel (Krogh and Vedelsby 1995).
 */
const AVERAGE_OF_MIXTURE = 0.8;
/** How unlike the factors of different series are: variance of their logarithm about what is expected. A quarter either way. */
const BETWEEN_SERIES = 0.06;
/** Variance of the log size of a horizon's errors that two independent normal errors would have, 1/(2·2). */
const BETWEEN_HORIZONS = 0.25;
/** That expectation weighs as much as this many horizons seen. */
const EXPECTED_HORIZONS = 2;
/** How unlike the tails of different series are: variance of the logarithm of their quantile over the normal one. */
const TAILS_BETWEEN = 0.015;
/** n times the variance of that logarithm for n normal shocks: p(1 − p)/(f q)² at the 80 % quantile q with density f. */
const TAILS_SAMPLING = 0.79;

/**
 * Deviations that the errors of an average will have, expected before any was seen, over those of its spread:
 * `AVERAGE_OF_MIXTURE` times (n + k)/(n − k) for k terms estimated from n values. The latter is Akaike's final
 * prediction error (1970), but of deviations rather than variances: an estimated term errs in every step ahead again.
 */
export function expectedWidening(count: number, terms: number): number {
  return (AVERAGE_OF_MIXTURE * (count + terms)) / Math.max(1, count - terms);
}

/**
 * Calibration from `horizons` independent horizons of evidence on a series of `count` values.
 *
 * At 80 and 95 % the factor is the quantile of past scores over the normal one, drawn toward what is expected:
 * `expected`, times the tails of the shocks. Both are averaged as logarithms, by the rule of a normal law of unknown
 * mean (Efron and Morris 1973): the variance of one horizon's log size over `BETWEEN_SERIES` is the number of horizons
 * that the expectation weighs. The former is that between the origins of this very series, itself drawn toward
 * `BETWEEN_HORIZONS`: where errors come in bursts, a quiet past says little. Weights that fall with age leave fewer
 * horizons in effect, (Σw)²/Σw² of the origins (Kish 1965). The tails of few shocks are mostly chance, and are drawn
 * toward the normal law's by the same rule.
 *
 * Student's degrees of freedom are count/6, at least 4, because the size of an error is itself estimated and errors of
 * real series have heavy tails.
 *
 * These numbers were set by the interval scores of one to four dates each on the M1 and M4 sets of the bench, 140
 * series and 350 short ones of panels from R's packages, 17 simulated kinds and four kinds of change in them, all
 * together, for 80 and 95 % to hold about that on all of them; half or twice any of the variances changes the mean score
 * by less than a hundredth.
 */
export function calibrate(
  evidence: CalibrationEvidence,
  expected: number,
  tails: ShockTails,
  horizons: number,
  count: number,
): Calibration {
  const { scores, weights, sizes, originWeights } = evidence;
  const freedom = Math.max(4, count / 6);
  const trust = TAILS_BETWEEN / (TAILS_BETWEEN + TAILS_SAMPLING / count);
  const before = { narrow: expected * tails.narrow ** trust, wide: expected * tails.wide ** trust };
  if (sizes.length === 0) return { ...before, freedom };
  const sum = originWeights.reduce((all, weight) => all + weight, 0);
  const squares = originWeights.reduce((all, weight) => all + weight * weight, 0);
  const effective = (horizons * sum * sum) / squares / sizes.length;
  const mean = sizes.reduce((all, size, o) => all + originWeights[o] * size, 0) / sum;
  const spread = sizes.reduce((all, size, o) => all + originWeights[o] * (size - mean) ** 2, 0) / sum;
  const between =
    (effective * spread + EXPECTED_HORIZONS * BETWEEN_HORIZONS) /
    (Math.max(0, effective - 1) + EXPECTED_HORIZONS);
  const share = effective / (effective + between / BETWEEN_SERIES);
  const order = [...scores.keys()].sort((a, b) => scores[a] - scores[b]);
  const total = weights.reduce((all, weight) => all + weight, 0);
  const blend = (probability: number, normal: number, unseen: number): number => {
    let passed = 0;
    let found = 0;
    for (const i of order) {
      passed += weights[i];
      found = scores[i];
      if (passed >= probability * total) break;
    }
    return Math.max(NEAREST, found / normal) ** share * unseen ** (1 - share);
  };
  const narrow = blend(0.8, NARROW, before.narrow);
  // A wider range must never be drawn in by luck in the past.
  return { narrow, wide: Math.max(narrow, blend(0.95, WIDE, before.wide)), freedom };
}

/** Deviations of the spread that belong to a standard normal quantile. Odd and increasing in `z`. */
export function calibratedReach({ narrow, wide, freedom }: Calibration, z: number): number {
  const share = Math.min(1, Math.max(0, (Math.abs(z) - NARROW) / (WIDE - NARROW)));
  return (narrow + share * (wide - narrow)) * studentFromNormal(z, freedom);
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
