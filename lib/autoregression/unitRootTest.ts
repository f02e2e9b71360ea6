import { leastSquares } from "../numeric/leastSquares.ts";
import { observedMean } from "../numeric/sums.ts";
import { tabulate } from "../numeric/tabulate.ts";
import { requireObserved, requireValues, requireWhole } from "./checks.ts";
import { changeRegression, schwertLags } from "./dickeyFuller.ts";
import {
  type CriticalValue,
  dickeyFullerGlsCriticalValues,
  dickeyFullerGlsPValue,
} from "./dickeyFullerDistribution.ts";
import { modifiedLags } from "./modifiedLags.ts";
import { constantColumn, trendColumn } from "./regressionTerms.ts";
import { withoutTerms } from "./withoutTerms.ts";

export interface UnitRootTest {
  readonly kind: "dickey-fuller-gls" | "kpss";
  readonly trend: boolean;
  readonly statistic: number;
  /** Chance of a statistic as extreme under the null hypothesis; for KPSS kept within 0.01..0.1, its table's ends. */
  readonly pValue: number;
  readonly criticalValues: readonly CriticalValue[];
  /** Lagged changes (DF-GLS), or bandwidth of the Bartlett kernel (KPSS). */
  readonly lags: number;
}

export interface UnitRootOptions {
  readonly kind: "dickey-fuller-gls" | "kpss";
  /** Whether the series may have a straight trend line besides its level. */
  readonly trend: boolean;
  readonly lags?: number;
}

/**
 * Two tests with opposite null hypotheses.
 *
 * - `dickey-fuller-gls` (Elliott, Rothenberg & Stock 1996). Null: shocks are permanent; a very negative statistic
 *   speaks against it. Level (and trend) are removed by quasi-differences with 1 − 7/n (1 − 13.5/n), then a
 *   Dickey–Fuller regression without terms. Lagged changes, unless given, by the modified AIC of Ng & Perron
 *   (2001) up to trunc(12 (n/100)^¼), on values detrended by least squares (Perron & Qu 2007).
 * - `kpss` (Kwiatkowski, Phillips, Schmidt & Shin 1992). Null: shocks fade; a large statistic speaks against it.
 *   Σ S_t²/n² over the long-run variance with a Bartlett kernel of bandwidth trunc(12 (n/100)^¼) unless given.
 *
 * Throws `RangeError` for gaps, constant values, or too few of them.
 *
 * @example unitRootTest(values, { kind: "kpss", trend: false }).statistic
 */
export function unitRootTest(values: ArrayLike<number>, options: UnitRootOptions): UnitRootTest {
  requireValues("unitRootTest", "values", values, "no-gaps");
  requireObserved("unitRootTest", values, 8);
  const { kind, trend } = options;
  if (typeof trend !== "boolean") {
    throw new TypeError(`unitRootTest needs trend to be true or false, got ${String(trend)}`);
  }
  if (options.lags !== undefined) requireWhole("unitRootTest", "lags", options.lags, 0);
  if (kind === "dickey-fuller-gls") return dickeyFullerGls(values, trend, options.lags);
  if (kind === "kpss") return kpss(values, trend, options.lags ?? schwertLags(values.length));
  throw new TypeError(`unitRootTest knows no kind ${String(kind)}`);
}

function dickeyFullerGls(values: ArrayLike<number>, trend: boolean, given: number | undefined): UnitRootTest {
  const detrended = quasiDetrend(values, trend);
  const most = Math.min(schwertLags(values.length), Math.floor((values.length - 5) / 3));
  const lags = given ?? modifiedLags(withoutTerms(values, trend), Math.max(0, most));
  const { statistic, change } = changeRegression(detrended, "none", lags, lags + 1);
  return {
    kind: "dickey-fuller-gls",
    trend,
    statistic,
    pValue: dickeyFullerGlsPValue(trend, statistic),
    criticalValues: dickeyFullerGlsCriticalValues(trend, change.length),
    lags,
  };
}

/** Values minus the level (and trend) fitted to quasi-differences. */
function quasiDetrend(values: ArrayLike<number>, trend: boolean): Float64Array {
  const n = values.length;
  const root = 1 - (trend ? 13.5 : 7) / n;
  const origin = observedMean(values);
  const centredValues = tabulate(n, (t) => values[t] - origin);
  const quasi = (column: ArrayLike<number>) =>
    tabulate(n, (t) => (t === 0 ? column[0] : column[t] - root * column[t - 1]));
  const terms = trend ? [constantColumn(n), trendColumn(n)] : [constantColumn(n)];
  const fit = leastSquares(terms.map(quasi), quasi(centredValues));
  const coefficients = fit?.coefficients ?? new Float64Array(terms.length);
  return centredValues.map((value, t) =>
    terms.reduce((rest, column, j) => rest - coefficients[j] * column[t], value),
  );
}

// Kwiatkowski, Phillips, Schmidt & Shin (1992), table 1.
const KPSS_SIGNIFICANCE = [0.1, 0.05, 0.025, 0.01];
const KPSS_LEVEL = [0.347, 0.463, 0.574, 0.739];
const KPSS_TREND = [0.119, 0.146, 0.176, 0.216];

function kpss(values: ArrayLike<number>, trend: boolean, lags: number): UnitRootTest {
  const n = values.length;
  const residuals = withoutTerms(values, trend);
  let partialSum = 0;
  let squares = 0;
  for (let t = 0; t < n; t++) {
    partialSum += residuals[t];
    squares += partialSum * partialSum;
  }
  let longRun = 0;
  for (let lag = 0; lag <= Math.min(lags, n - 1); lag++) {
    let product = 0;
    for (let t = lag; t < n; t++) product += residuals[t] * residuals[t - lag];
    longRun += (lag === 0 ? 1 : 2) * (1 - lag / (lags + 1)) * product;
  }
  longRun /= n;
  if (!(longRun > 0)) throw new RangeError("unitRootTest needs values that vary, got a constant series");
  const statistic = squares / (n * n) / longRun;
  const table = trend ? KPSS_TREND : KPSS_LEVEL;
  return {
    kind: "kpss",
    trend,
    statistic,
    pValue: interpolate(statistic, table, KPSS_SIGNIFICANCE),
    criticalValues: table.map((value, i) => ({ significance: KPSS_SIGNIFICANCE[i], value })),
    lags,
  };
}

/** Piecewise linear, constant beyond the ends; `x` ascending. */
function interpolate(at: number, x: readonly number[], y: readonly number[]): number {
  if (at <= x[0]) return y[0];
  for (let i = 1; i < x.length; i++) {
    if (at <= x[i]) return y[i - 1] + ((y[i] - y[i - 1]) * (at - x[i - 1])) / (x[i] - x[i - 1]);
  }
  return y[y.length - 1];
}
