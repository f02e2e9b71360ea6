import { describe, expect, it } from "vitest";
import { fitAutoregression } from "../../lib/autoregression/fitAutoregression.ts";
import { ljungBox } from "../../lib/autoregression/ljungBox.ts";
import { partialAutocorrelations, sampleAutocovariances } from "../../lib/autoregression/sampleMoments.ts";
import { selectOrder } from "../../lib/autoregression/selectOrder.ts";
import { withR } from "../support/r.ts";

const DATASETS = [
  "lh",
  "Nile",
  "nhtemp",
  "LakeHuron",
  "log10(lynx)",
  "sunspot.year",
  "diff(BJsales)",
  "diff(WWWusage)",
  "discoveries",
  "USAccDeaths",
  "nottem",
  "window(treering, -1000, -701)",
];

const r = withR();

function expectClose(got: ArrayLike<number>, expected: readonly number[], relative = 1e-9): void {
  expect(got).toHaveLength(expected.length);
  const largest = Math.max(...expected.map(Math.abs));
  expected.forEach((value, i) => {
    expect(Math.abs(got[i] - value)).toBeLessThanOrEqual(relative * largest);
  });
}

describe.each(DATASETS)("on R's %s", (dataset) => {
  it("autocovariances and partial autocorrelations agree with acf and pacf", async () => {
    const values = await r.evaluate(dataset);
    expectClose(
      sampleAutocovariances(values, 20),
      await r.evaluate(`acf(${dataset}, 20, type = "covariance", plot = FALSE)$acf`),
    );
    expectClose(
      partialAutocorrelations(values, 20),
      await r.evaluate(`pacf(${dataset}, 20, plot = FALSE)$acf`),
    );
  });

  it("Yule–Walker agrees with ar.yw for orders 1 to 6, its variance without the factor n/(n − p − 1)", async () => {
    const values = await r.evaluate(dataset);
    const n = values.length;
    for (let order = 1; order <= 6; order++) {
      const fit = fitAutoregression(values, { order, method: "yule-walker" });
      const code = `f <- ar.yw(${dataset}, FALSE, ${order})`;
      expectClose(fit.coefficients, await r.evaluate(`${code}; f$ar`));
      expectClose([(fit.innovationVariance * n) / (n - order - 1)], await r.evaluate(`${code}; f$var.pred`));
      const errors = fit.standardErrors.map((error) => error * Math.sqrt(n / (n - order - 1)));
      expectClose(errors, await r.evaluate(`${code}; sqrt(diag(f$asy.var.coef))`));
    }
  });

  it("Burg agrees with ar.burg for orders 1 to 6", async () => {
    const values = await r.evaluate(dataset);
    for (let order = 1; order <= 6; order++) {
      const fit = fitAutoregression(values, { order, method: "burg" });
      const code = `f <- ar.burg(${dataset}, FALSE, ${order}, var.method = 1)`;
      expectClose(fit.coefficients, await r.evaluate(`${code}; f$ar`));
      expectClose([fit.innovationVariance], await r.evaluate(`${code}; f$var.pred`));
      expectClose(fit.standardErrors, await r.evaluate(`${code}; sqrt(diag(f$asy.var.coef))`));
    }
  });

  it("Burg's choice of order 0 to 15 by AIC is ar's", async () => {
    const values = await r.evaluate(dataset);
    const choice = selectOrder(values, { maxOrder: 15, criterion: "aic", method: "burg" });
    const aic = await r.evaluate(`ar(${dataset}, order.max = 15, method = "burg")$aic`);
    const least = Math.min(...choice.values);
    choice.values.forEach((value, order) => {
      expect(value - least).toBeCloseTo(aic[order], 8);
    });
    expect(choice.order).toBe(aic.indexOf(0));
  });

  it("least squares agrees with lm on lagged columns for orders 1 to 6", async () => {
    const values = await r.evaluate(dataset);
    for (let order = 1; order <= 6; order++) {
      const fit = fitAutoregression(values, { order, method: "least-squares" });
      const code = `x <- as.numeric(${dataset}); e <- embed(x, ${order + 1}); f <- summary(lm(e[, 1] ~ e[, -1]))`;
      expectClose(fit.coefficients, await r.evaluate(`${code}; f$coefficients[-1, 1]`), 1e-8);
      expectClose(fit.standardErrors, await r.evaluate(`${code}; f$coefficients[-1, 2]`), 1e-8);
      expectClose([fit.innovationVariance], await r.evaluate(`${code}; f$sigma^2`), 1e-8);
      expectClose([fit.logLikelihood], await r.evaluate(`${code}; logLik(lm(e[, 1] ~ e[, -1]))`), 1e-9);
    }
  });

  it("the Ljung–Box statistic and p-value agree with Box.test", async () => {
    const values = await r.evaluate(dataset);
    for (const lags of [5, 10, 20]) {
      const test = ljungBox(values, { lags, fittedParameters: 2 });
      const [statistic, pValue] = await r.evaluate(
        `b <- Box.test(${dataset}, ${lags}, "Ljung-Box", fitdf = 2); c(b$statistic, b$p.value)`,
      );
      expect(test.statistic / statistic).toBeCloseTo(1, 10);
      expect(Math.abs(test.pValue - pValue)).toBeLessThan(1e-8 + 1e-8 * pValue);
    }
  });
});
