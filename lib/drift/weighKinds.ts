import type { LookState } from "./lookState.ts";

/**
 * Linear scores of level, persistence and shock size, fitted by multinomial logistic regression on 2,700 namings
 * of simulated changes (sixteen cases of sizes, directions and tails; half of them held back named 88 % right,
 * where the log odds alone named 84 %). Columns: one; log odds of the three kinds; how far each statistic is
 * past its boundary; the persistence of the reference; ln of the values since the change; 1/ν; persistence
 * times each log odds. A rise of persistence, for one, makes excursions that a level explains almost as well, so
 * the plain odds name it too seldom.
 */
const scores = [
  [-0.63, 0.468, -0.136, 0.035, 0.15, 0.047, -0.116, 0.681, 0.059, -0.055, 0.447, -0.092, -0.35],
  [0.091, -0.119, 0.404, -0.34, -0.08, 0.418, -0.31, -1.261, 0.145, -0.071, -0.376, 0.287, 0.51],
  [0.54, -0.349, -0.268, 0.305, -0.07, -0.466, 0.426, 0.58, -0.204, 0.127, -0.071, -0.195, -0.16],
];
/** With trend or season there are more kinds than the scores know: there, fixed leads are added to the log odds. */
const leads: Readonly<Record<string, number>> = { persistence: 1.5, "shock-size": 0.5 };

const within = (value: number, low: number, high: number) => Math.min(Math.max(value, low), high);

/**
 * Score of each watched kind, the log of its probability up to a constant.
 *
 * @param logOdds that each kind takes part in the change
 * @param boundaries of the statistics, by kind
 * @param since values since the change
 */
export function weighKinds(
  state: LookState,
  logOdds: readonly number[],
  boundaries: ArrayLike<number>,
  since: number,
): number[] {
  if (logOdds.length > scores.length)
    return state.kinds.map((kind, index) => logOdds[index] + (leads[kind] ?? 0));
  const odds = logOdds.map((value) => within(value, -12, 12));
  const past = logOdds.map((_, kind) => within(state.statistics[kind] - boundaries[kind], -6, 12));
  const { weights, degreesOfFreedom } = state.reference;
  const persistence = 1 - weights.reduce((sum, weight) => sum + weight, 0);
  const features = [
    1,
    ...odds,
    ...past,
    persistence,
    Math.log(since),
    1 / degreesOfFreedom,
    ...odds.map((value) => persistence * value),
  ];
  return scores.map((row) => row.reduce((sum, score, i) => sum + score * features[i], 0));
}
