import { type PredictiveSpread, spreadScore } from "./predictiveSpread.ts";

/** Scores of past outcomes under the spread that was forecast for them, each with the weight its evidence has. */
export interface CalibrationEvidence {
  readonly scores: number[];
  readonly weights: number[];
}

/** Adds the outcomes of one origin. `weight` is shared over its observed steps, for they are not independent. */
export function addOutcomes(
  evidence: CalibrationEvidence,
  spread: PredictiveSpread,
  outcomes: ArrayLike<number>,
  from: number,
  weight: number,
): void {
  const steps = spread.medians.length;
  for (let h = 0; h < steps; h++) {
    const outcome = outcomes[from + h];
    if (Number.isNaN(outcome)) continue;
    evidence.scores.push(spreadScore(spread, h, outcome));
    evidence.weights.push(weight / steps);
  }
}

/** Weight, in origins, of the belief that the model's own spread is right. */
const PRIOR_ORIGINS = 2;
/** A single past outcome counts for no more than this many deviations. */
const FARTHEST = 4;

/**
 * Factor on the spread: the root mean squared score of past outcomes, drawn to `prior` (what the model should be
 * wrong by for its estimated parameters) with the weight of two origins.
 */
export function spreadFactor(evidence: CalibrationEvidence, prior: number): number {
  let sum = PRIOR_ORIGINS * prior * prior;
  let weight = PRIOR_ORIGINS;
  for (let i = 0; i < evidence.scores.length; i++) {
    const score = Math.min(FARTHEST, Math.abs(evidence.scores[i]));
    sum += evidence.weights[i] * score * score;
    weight += evidence.weights[i];
  }
  return Math.sqrt(sum / weight);
}
