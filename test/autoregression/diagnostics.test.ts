import { describe, expect, it } from "vitest";
import { archTest, breuschGodfrey } from "../../lib/autoregression/lagrangeTests.ts";
import { ljungBox, mcLeodLi } from "../../lib/autoregression/ljungBox.ts";
import { durbinWatson, jarqueBera } from "../../lib/autoregression/residualShape.ts";
import { withR } from "../support/r.ts";

const r = withR();
/** Residuals of Nile, AR(1) by least squares with an intercept. */
const RESIDUALS = "x <- as.numeric(Nile); e <- resid(lm(x[-1] ~ x[-100]))";

describe("ljungBox", () => {
  it("and mcLeodLi agree with R's Box.test, p-values far in the tail included", async () => {
    const residuals = await r.evaluate(RESIDUALS);
    for (const lags of [3, 12]) {
      const [statistic, pValue] = await r.evaluate(
        `${RESIDUALS}; b <- Box.test(e, ${lags}, "Ljung-Box", fitdf = 1); c(b$statistic, b$p.value)`,
      );
      const test = ljungBox(residuals, { lags, fittedParameters: 1 });
      expect([test.statistic, test.degreesOfFreedom]).toEqual([expect.closeTo(statistic, 9), lags - 1]);
      expect(test.pValue).toBeCloseTo(pValue, 10);
      const squares = await r.evaluate(`${RESIDUALS}; Box.test(e^2, ${lags}, "Ljung-Box")$statistic`);
      expect(mcLeodLi(residuals, { lags }).statistic).toBeCloseTo(squares[0], 9);
    }
    const far = ljungBox(await r.evaluate("LakeHuron"), { lags: 20, fittedParameters: 0 });
    const [tail] = await r.evaluate(`Box.test(LakeHuron, 20, "Ljung-Box")$statistic`);
    const [logTail] = await r.evaluate(`pchisq(${tail}, 20, lower.tail = FALSE, log.p = TRUE)`);
    expect(Math.log(far.pValue) / logTail).toBeCloseTo(1, 9);
  });

  it("leaves out the first residuals that a fit does not have", async () => {
    const residuals = await r.evaluate(RESIDUALS);
    const padded = [Number.NaN, ...residuals];
    expect(ljungBox(padded, { lags: 5, fittedParameters: 1 })).toEqual(
      ljungBox(residuals, { lags: 5, fittedParameters: 1 }),
    );
  });

  it("needs more lags than fitted parameters, and residuals that vary", () => {
    expect(() => ljungBox([1, 2, 3, 4], { lags: 2, fittedParameters: 2 })).toThrow(/fittedParameters/);
    expect(() => ljungBox([1, 1, 1, 1], { lags: 1, fittedParameters: 0 })).toThrow(/vary/);
    expect(() => ljungBox([1, 2], { lags: 5, fittedParameters: 0 })).toThrow(/at least 6/);
  });
});

describe("tests of shape and variance", () => {
  it("jarqueBera and durbinWatson follow their definitions, computed in R", async () => {
    const residuals = await r.evaluate(RESIDUALS);
    const [statistic, pValue, watson] = await r.evaluate(
      `${RESIDUALS}; d <- e - mean(e); s <- mean(d^3) / mean(d^2)^1.5; k <- mean(d^4) / mean(d^2)^2; n <- length(e);
       j <- n / 6 * (s^2 + (k - 3)^2 / 4); c(j, pchisq(j, 2, lower.tail = FALSE), sum(diff(e)^2) / sum(e^2))`,
    );
    const shape = jarqueBera(residuals);
    expect(shape.statistic).toBeCloseTo(statistic, 10);
    expect(shape.pValue).toBeCloseTo(pValue, 10);
    expect(durbinWatson(residuals)).toBeCloseTo(watson, 10);
    // R 4.2.2, tseries 0.10.53 jarque.bera.test on the same residuals.
    expect(shape.statistic).toBeCloseTo(1.486840299930627, 6);
  });

  it("archTest is n R² of the squares on their lags", async () => {
    const residuals = await r.evaluate(RESIDUALS);
    const [statistic] = await r.evaluate(
      `${RESIDUALS}; m <- embed(e^2, 5); f <- summary(lm(m[, 1] ~ m[, -1])); nrow(m) * f$r.squared`,
    );
    expect(archTest(residuals, { lags: 4 }).statistic).toBeCloseTo(statistic, 9);
  });

  it("breuschGodfrey agrees with lmtest's bgtest", async () => {
    // R 4.2.2, lmtest 0.9.40: bgtest(order = 3, fill = 0) on an AR(1) by lm.
    const lh = breuschGodfrey(await r.evaluate("lh"), { order: 1, lags: 3 });
    expect(lh.statistic).toBeCloseTo(4.828451993393837, 8);
    expect(lh.pValue).toBeCloseTo(0.18479842444259095, 8);
    const nhtemp = breuschGodfrey(await r.evaluate("nhtemp"), { order: 1, lags: 3 });
    expect(nhtemp.statistic).toBeCloseTo(5.017250996186074, 7);
  });
});
