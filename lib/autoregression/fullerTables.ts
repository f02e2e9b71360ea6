import type { CriticalValue, DeterministicTerms } from "./dickeyFullerDistribution.ts";

/** Rows of the tables: numbers of observations. */
const OBSERVATIONS = [25, 50, 100, 250, 500, Number.POSITIVE_INFINITY];

/** Columns: chance of a statistic below the value. */
const PROBABILITIES = [0.01, 0.025, 0.05, 0.1, 0.9, 0.95, 0.975, 0.99];

// Fuller (1976), Introduction to Statistical Time Series, table 8.5.2.
const TABLES: Record<DeterministicTerms, readonly (readonly number[])[]> = {
  none: [
    [-2.66, -2.26, -1.95, -1.6, 0.92, 1.33, 1.7, 2.16],
    [-2.62, -2.25, -1.95, -1.61, 0.91, 1.31, 1.66, 2.08],
    [-2.6, -2.24, -1.95, -1.61, 0.9, 1.29, 1.64, 2.03],
    [-2.58, -2.23, -1.95, -1.62, 0.89, 1.29, 1.63, 2.01],
    [-2.58, -2.23, -1.95, -1.62, 0.89, 1.28, 1.62, 2],
    [-2.58, -2.23, -1.95, -1.62, 0.89, 1.28, 1.62, 2],
  ],
  constant: [
    [-3.75, -3.33, -3, -2.63, -0.37, 0, 0.34, 0.72],
    [-3.58, -3.22, -2.93, -2.6, -0.4, -0.03, 0.29, 0.66],
    [-3.51, -3.17, -2.89, -2.58, -0.42, -0.05, 0.26, 0.63],
    [-3.46, -3.14, -2.88, -2.57, -0.42, -0.06, 0.24, 0.62],
    [-3.44, -3.13, -2.87, -2.57, -0.43, -0.07, 0.24, 0.61],
    [-3.43, -3.12, -2.86, -2.57, -0.44, -0.07, 0.23, 0.6],
  ],
  trend: [
    [-4.38, -3.95, -3.6, -3.24, -1.14, -0.8, -0.5, -0.15],
    [-4.15, -3.8, -3.5, -3.18, -1.19, -0.87, -0.58, -0.24],
    [-4.04, -3.73, -3.45, -3.15, -1.22, -0.9, -0.62, -0.28],
    [-3.99, -3.69, -3.43, -3.13, -1.23, -0.92, -0.64, -0.31],
    [-3.98, -3.68, -3.42, -3.13, -1.24, -0.93, -0.65, -0.32],
    [-3.96, -3.66, -3.41, -3.12, -1.25, -0.94, -0.66, -0.33],
  ],
};

/**
 * The printed small-sample table of the Dickey–Fuller t statistic at 1, 5 and 10 %, between rows linear in the number
 * of observations. `dickeyFullerCriticalValues` has smoother and newer numbers; these serve comparison with books.
 *
 * @example fullerCriticalValues("constant", 50) // -3.58, -2.93, -2.6
 */
export function fullerCriticalValues(terms: DeterministicTerms, observations: number): CriticalValue[] {
  const row = quantilesAt(terms, observations);
  return [0, 2, 3].map((column) => ({ significance: PROBABILITIES[column], value: row[column] }));
}

/**
 * Chance of a Dickey–Fuller t statistic this low, by linear interpolation in the printed table; kept within its ends,
 * 0.01 and 0.99, as R's `tseries::adf.test` does.
 */
export function fullerPValue(terms: DeterministicTerms, statistic: number, observations: number): number {
  const row = quantilesAt(terms, observations);
  if (statistic <= row[0]) return PROBABILITIES[0];
  for (let i = 1; i < row.length; i++) {
    if (statistic > row[i]) continue;
    const share = (statistic - row[i - 1]) / (row[i] - row[i - 1]);
    return PROBABILITIES[i - 1] + share * (PROBABILITIES[i] - PROBABILITIES[i - 1]);
  }
  return PROBABILITIES[PROBABILITIES.length - 1];
}

function quantilesAt(terms: DeterministicTerms, observations: number): readonly number[] {
  const table = TABLES[terms];
  if (!(observations > OBSERVATIONS[0])) return table[0];
  const above = OBSERVATIONS.findIndex((n) => n >= observations);
  // The table's infinity is taken as 100,000 observations.
  const at = (i: number) => Math.min(OBSERVATIONS[i], 1e5);
  const share = (Math.min(observations, 1e5) - at(above - 1)) / (at(above) - at(above - 1));
  return table[above].map((value, i) => table[above - 1][i] + share * (value - table[above - 1][i]));
}
