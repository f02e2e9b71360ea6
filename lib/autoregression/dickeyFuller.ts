import { type LeastSquares, leastSquares } from "../numeric/leastSquares.ts";
import { observedMean } from "../numeric/sums.ts";
import { tabulate } from "../numeric/tabulate.ts";
import { requireObserved, requireValues, requireWhole } from "./checks.ts";
import { informationCriteria } from "./criteria.ts";
import {
  type CriticalValue,
  type DeterministicTerms,
  dickeyFullerCriticalValues,
  dickeyFullerPValue,
} from "./dickeyFullerDistribution.ts";

export interface DickeyFullerTest {
  /** t ratio of the level in the regression of the change; very negative speaks against a unit root. */
  readonly statistic: number;
  /** Chance of a statistic this low under a unit root. */
  readonly pValue: number;
  readonly criticalValues: readonly CriticalValue[];
  /** Lagged changes in the regression. */
  readonly lags: number;
  /** Rows of the regression. */
  readonly observations: number;
  /** F statistics of Dickey & Fuller (1981); `NaN` where the terms have none. */
  readonly jointStatistics: {
    /** All terms and the unit root together: Φ1 with a constant, Φ2 with a trend. */
    readonly constantAndRoot: number;
    /** Trend and unit root together: Φ3. */
    readonly trendAndRoot: number;
  };
}

/**
 * Augmented Dickey–Fuller test (Dickey & Fuller 1979; Said & Dickey 1984). Null hypothesis: a unit root, so shocks are
 * permanent. Regression Δx_t = terms + (ρ − 1) x_{t−1} + Σ δ_i Δx_{t−i} + e_t. With `lags` given that many lagged changes
 * are used; else 0..maxLags (default trunc(12 (n/100)^¼), Schwert 1989) are compared by AIC on one sample and the best
 * is estimated again on all its rows. p-value and critical values: MacKinnon (1994, 2010).
 *
 * Throws `RangeError` for gaps, constant values, or too few of them.
 */
export function dickeyFullerTest(
  values: ArrayLike<number>,
  options: { readonly terms: DeterministicTerms; readonly lags?: number; readonly maxLags?: number },
): DickeyFullerTest {
  const { terms } = options;
  requireValues("dickeyFullerTest", "values", values, "no-gaps");
  const lags = options.lags ?? chooseLags(values, terms, options.maxLags ?? schwertLags(values.length));
  requireWhole("dickeyFullerTest", "lags", lags, 0);
  requireObserved("dickeyFullerTest", values, 2 * lags + 5);
  const { statistic, fit, columns, change } = changeRegression(values, terms, lags, lags + 1);
  const rows = change.length;
  return {
    statistic,
    pValue: dickeyFullerPValue(terms, statistic),
    criticalValues: dickeyFullerCriticalValues(terms, rows),
    lags,
    observations: rows,
    jointStatistics: {
      constantAndRoot: terms === "none" ? Number.NaN : jointF(fit, columns, change, lags, 0),
      trendAndRoot: terms === "trend" ? jointF(fit, columns, change, lags, 1) : Number.NaN,
    },
  };
}

/** Schwert's (1989) longest lag, trunc(12 (n/100)^¼). */
export function schwertLags(n: number): number {
  return Math.trunc(12 * (n / 100) ** 0.25);
}

interface ChangeRegression {
  readonly statistic: number;
  readonly fit: LeastSquares;
  /** Terms, then the level, then the lagged changes. */
  readonly columns: readonly Float64Array[];
  readonly change: Float64Array;
}

/** The regression over rows t ≥ firstRow; also serves DF-GLS. */
export function changeRegression(
  values: ArrayLike<number>,
  terms: DeterministicTerms,
  lags: number,
  firstRow: number,
): ChangeRegression {
  const rows = values.length - firstRow;
  const column = (of: (t: number) => number) => tabulate(Math.max(0, rows), (i) => of(firstRow + i));
  // With a constant among the terms the origin of the level is free.
  const origin = terms === "none" ? 0 : observedMean(values);
  const columns: Float64Array[] = [];
  if (terms !== "none") columns.push(column(() => 1));
  if (terms === "trend") columns.push(column((t) => t - values.length / 2));
  const level = columns.length;
  columns.push(column((t) => values[t - 1] - origin));
  for (let i = 1; i <= lags; i++) columns.push(column((t) => values[t - i] - values[t - i - 1]));
  const change = column((t) => values[t] - values[t - 1]);
  const fit = leastSquares(columns, change);
  const k = columns.length;
  if (fit === undefined || rows <= k || !(fit.residualSumOfSquares > 0)) {
    throw new RangeError(
      `a unit-root regression with ${lags} lags needs more than ${k} rows of values that vary, got ${rows}`,
    );
  }
  const variance = (fit.residualSumOfSquares / (rows - k)) * fit.unscaledCovariance[level * k + level];
  return { statistic: fit.coefficients[level] / Math.sqrt(variance), fit, columns, change };
}

/** F test that the root is one and the terms from index `from` on are zero. */
function jointF(
  fit: LeastSquares,
  columns: readonly Float64Array[],
  change: Float64Array,
  lags: number,
  from: number,
): number {
  const terms = columns.length - lags - 1;
  const kept = [...columns.slice(0, from), ...columns.slice(terms + 1)];
  const restricted = leastSquares(kept, change)?.residualSumOfSquares ?? Number.NaN;
  const tested = columns.length - kept.length;
  const free = change.length - columns.length;
  return (restricted - fit.residualSumOfSquares) / tested / (fit.residualSumOfSquares / free);
}

function chooseLags(values: ArrayLike<number>, terms: DeterministicTerms, maxLags: number): number {
  requireWhole("dickeyFullerTest", "maxLags", maxLags, 0);
  let best = 0;
  let least = Number.POSITIVE_INFINITY;
  for (let lags = 0; lags <= maxLags; lags++) {
    const { fit, columns, change } = changeRegression(values, terms, lags, maxLags + 1);
    const rows = change.length;
    const likelihood = -0.5 * rows * (Math.log((2 * Math.PI * fit.residualSumOfSquares) / rows) + 1);
    const { aic } = informationCriteria(likelihood, columns.length, rows);
    if (aic < least) {
      least = aic;
      best = lags;
    }
  }
  return best;
}
