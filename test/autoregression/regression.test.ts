import { describe, expect, it } from "vitest";
import { fitAutoregression } from "../../lib/autoregression/fitAutoregression.ts";
import { generalisedLeastSquares } from "../../lib/autoregression/generalisedLeastSquares.ts";
import {
  constantColumn,
  eventColumn,
  harmonicColumns,
  seasonalColumns,
  stepColumn,
  trendColumn,
} from "../../lib/autoregression/regressionTerms.ts";
import { simulate, withGaps } from "../support/arbitraryProcess.ts";
import { withR } from "../support/r.ts";

const r = withR();

describe("regression terms", () => {
  it("go on past the data where start says", () => {
    expect(Array.from(trendColumn(3, 10))).toEqual([11, 12, 13]);
    expect(Array.from(stepColumn(4, 2))).toEqual([0, 0, 1, 1]);
    expect(Array.from(stepColumn(2, 2, 4))).toEqual([1, 1]);
    expect(Array.from(eventColumn(4, [1, 6]))).toEqual([0, 1, 0, 0]);
    expect(Array.from(eventColumn(4, [1, 6], 4))).toEqual([0, 0, 1, 0]);
    const all = harmonicColumns(30, 12, 6);
    harmonicColumns(6, 12, 6, 24).forEach((column, k) => {
      column.forEach((value, i) => {
        expect(value).toBeCloseTo(all[k][24 + i], 12);
      });
    });
  });

  it("has one harmonic column less at half the period, where the sine is zero", () => {
    expect(harmonicColumns(24, 12, 6)).toHaveLength(11);
    expect(harmonicColumns(24, 7, 3)).toHaveLength(6);
    expect(() => harmonicColumns(24, 12, 7)).toThrow(/period\/2/);
  });

  it("has seasonal columns that leave the level alone", () => {
    for (const column of seasonalColumns(24, 12)) {
      expect(column.reduce((sum, value) => sum + value, 0)).toBe(0);
    }
  });

  it("tells the same season by dummies as by all harmonics", () => {
    const season = [3, -1, 4, 1];
    const values = simulate([0.5], 80, 5).map((value, t) => value + 10 * season[t % 4]);
    const likelihoodWith = (columns: Float64Array[]) =>
      fitAutoregression(values, {
        order: 1,
        method: "maximum-likelihood",
        regressors: [constantColumn(80), ...columns],
      }).logLikelihood;
    expect(likelihoodWith(seasonalColumns(80, 4))).toBeCloseTo(likelihoodWith(harmonicColumns(80, 4, 2)), 7);
  });
});

describe("generalisedLeastSquares", () => {
  it("is the whitened regression that R computes from the whole covariance matrix", async () => {
    const values = await r.evaluate("LakeHuron");
    const columns = [values.map(() => 1), values.map((_, i) => i + 1)];
    const fit = generalisedLeastSquares(values, columns, [1, -0.3]);
    const expected = await r.evaluate(
      `y <- as.numeric(LakeHuron); X <- cbind(1, seq_along(y)); n <- length(y)
       a <- ARMAacf(c(1, -0.3), lag.max = n - 1); psi <- ARMAtoMA(c(1, -0.3), lag.max = 3000)
       V <- toeplitz(a) * (1 + sum(psi^2)); W <- solve(V); b <- solve(t(X) %*% W %*% X, t(X) %*% W %*% y)
       e <- y - X %*% b; s <- as.numeric(t(e) %*% W %*% e)
       c(b, sqrt(diag(solve(t(X) %*% W %*% X)) * s / n), s, -n / 2 * (log(2 * pi * s / n) + 1) - determinant(V)$modulus / 2)`,
    );
    const got = [...fit.coefficients, ...fit.standardErrors, fit.sumOfSquares, fit.logLikelihood];
    expected.forEach((value, i) => {
      expect(got[i] / value).toBeCloseTo(1, 7);
    });
  });

  it("of white noise is ordinary least squares", () => {
    const fit = generalisedLeastSquares([1, 2, 4], [[1, 1, 1]], [0]);
    expect(fit.coefficients[0]).toBeCloseTo(7 / 3, 12);
  });
});

describe("maximum likelihood with regressors", () => {
  it("does not care in what units or from where a column is measured", () => {
    const values = withGaps(simulate([0.6], 90, 2), [4, 30, 31, 32, 77]).map((value, t) => value + 0.05 * t);
    const near = [constantColumn(90), trendColumn(90)];
    const far = [constantColumn(90), trendColumn(90).map((t) => 1e6 * t + 1e9)];
    const estimate = (regressors: Float64Array[]) =>
      fitAutoregression(values, { order: 1, method: "maximum-likelihood", regressors });
    const one = estimate(near);
    const other = estimate(far);
    expect(other.coefficients[0]).toBeCloseTo(one.coefficients[0], 6);
    expect(other.logLikelihood).toBeCloseTo(one.logLikelihood, 6);
    expect((other.regression?.coefficients[1] ?? 0) * 1e6).toBeCloseTo(
      one.regression?.coefficients[1] ?? 0,
      6,
    );
    expect((other.regression?.standardErrors[1] ?? 0) * 1e6).toBeCloseTo(
      one.regression?.standardErrors[1] ?? 0,
      6,
    );
  });

  it("finds a level step and an event where they were put", () => {
    const values = simulate([0.4], 200, 9).map(
      (value, t) => value + (t >= 120 ? 6 : 0) + (t === 50 ? -9 : 0),
    );
    const regressors = [constantColumn(200), stepColumn(200, 120), eventColumn(200, [50])];
    const { regression } = fitAutoregression(values, { order: 1, method: "maximum-likelihood", regressors });
    const { coefficients = [], standardErrors = [] } = regression ?? {};
    expect(Math.abs(coefficients[1] - 6)).toBeLessThan(4 * standardErrors[1]);
    expect(Math.abs(coefficients[2] + 9)).toBeLessThan(4 * standardErrors[2]);
  });
});
