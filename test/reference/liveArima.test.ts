import { describe, expect, it } from "vitest";
import { fitAutoregression } from "../../lib/autoregression/fitAutoregression.ts";
import { predict } from "../../lib/autoregression/predict.ts";
import { withR } from "../support/r.ts";

// R's own datasets and R's own functions, run live. One of them has gaps.
const DATASETS = [
  "lh",
  "Nile",
  "nhtemp",
  "LakeHuron",
  "log10(lynx)",
  "sunspot.year",
  "presidents",
  "diff(BJsales)",
  "diff(WWWusage)",
  "discoveries",
  "USAccDeaths",
  "nottem",
  "window(treering, -1000, -701)",
];
const ORDERS = [1, 2, 3, 4, 5, 6];

const r = withR();

/** |got − expected| as a share of `unit`, the largest over the entries. */
function distance(got: ArrayLike<number>, expected: readonly number[], unit: readonly number[]): number {
  return expected.reduce((worst, value, i) => Math.max(worst, Math.abs(got[i] - value) / unit[i]), 0);
}

describe.each(DATASETS)("exact maximum likelihood on R's %s", (dataset) => {
  it("is nowhere below arima(method = 'ML'), and where the two meet all numbers agree", async () => {
    const values = await r.evaluate(dataset);
    let met = 0;
    for (const order of ORDERS) {
      const fit = fitAutoregression(values, { order, method: "maximum-likelihood" });
      // Tighter stopping than R's default, which ends up to 1e-3 below the maximum. The mean stays free.
      const answer = await r.evaluate(
        `f <- arima(${dataset}, c(${order}, 0, 0), method = "ML", optim.control = list(reltol = 1e-14, maxit = 1000));
         p <- predict(f, n.ahead = 8);
         c(f$loglik, f$sigma2, f$coef, sqrt(diag(f$var.coef)), p$pred, p$se)`,
      );
      const [logLikelihood, sigma2] = answer;
      const coefficients = answer.slice(2, 3 + order);
      const errors = answer.slice(3 + order, 4 + 2 * order);
      const means = answer.slice(4 + 2 * order, 12 + 2 * order);
      const spreads = answer.slice(12 + 2 * order);
      expect(fit.logLikelihood).toBeGreaterThan(logLikelihood - 1e-6);
      if (fit.logLikelihood > logLikelihood + 1e-6) continue;
      met++;
      // A likelihood within 1e-6 of the maximum holds estimates within about 1.5e-3 standard errors of it.
      expect(distance([...fit.coefficients, fit.mean], coefficients, errors)).toBeLessThan(2e-3);
      expect(distance([...fit.standardErrors, fit.meanStandardError], errors, errors)).toBeLessThan(0.01);
      expect(fit.innovationVariance / sigma2).toBeCloseTo(1, 4);
      const prediction = predict(fit, values, { horizon: 8 });
      expect(distance(prediction.mean, means, spreads)).toBeLessThan(2e-3);
      expect(distance(prediction.standardErrors, spreads, spreads)).toBeLessThan(1e-3);
    }
    expect(met).toBeGreaterThanOrEqual(4);
  });
});
