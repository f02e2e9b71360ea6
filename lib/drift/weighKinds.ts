import type { LookState } from "./lookState.ts";
import type { ChangeNotice } from "./notice.ts";

/**
 * Linear scores of level, persistence and shock size, fitted by multinomial logistic regression on 13,000 namings of
 * simulated changes (31 cases of sizes, directions, orders and tails, the kinds weighted equally but for persistence
 * about a fifth more). Columns: one; log odds of the three kinds; how far each statistic is past its boundary. A rise of
 * persistence makes excursions that a level explains almost as well, so the plain odds name it too seldom. Those at
 * the notice, where a statistic has only just passed its boundary, are fitted on namings at the notice alone.
 */
const scores = {
  provisional: [
    [-0.38, 0.655, 0.083, 0.003, 0.189, -0.383, -0.222],
    [-0.149, 0.054, 0.245, 0.004, -0.602, 1.117, -0.372],
    [0.529, -0.709, -0.329, -0.007, 0.413, -0.734, 0.595],
  ],
  confirmed: [
    [-0.407, 0.633, -0.038, 0.005, 0.238, -0.119, -0.246],
    [-0.083, 0.04, 0.39, -0.014, -0.514, 0.912, -0.343],
    [0.49, -0.673, -0.352, 0.009, 0.276, -0.794, 0.589],
  ],
};

/** With trend or season there are more kinds than the scores know: there, fixed leads are added to the log odds. */
const leads: Readonly<Record<string, number>> = { persistence: 0.5 };

const within = (value: number, low: number, high: number) => Math.min(Math.max(value, low), high);

/**
 * Score of each watched kind, the log of its probability up to a constant.
 *
 * @param logOdds that each kind takes part in the change
 * @param boundaries of the statistics, by kind
 */
export function weighKinds(
  state: LookState,
  logOdds: readonly number[],
  boundaries: ArrayLike<number>,
  status: ChangeNotice["status"],
): number[] {
  const rows = scores[status];
  if (logOdds.length > rows.length)
    return state.kinds.map((kind, index) => logOdds[index] + (leads[kind] ?? 0));
  const odds = logOdds.map((value) => within(value, -20, 20));
  const past = logOdds.map((_, kind) => within(state.statistics[kind] - boundaries[kind], -6, 2));
  const features = [1, ...odds, ...past];
  return rows.map((row) => row.reduce((sum, score, i) => sum + score * features[i], 0));
}
