import { describe, expect, it } from "vitest";
import { fitAutoregression } from "../../lib/autoregression/fitAutoregression.ts";
import { sampleAutocovariances } from "../../lib/autoregression/sampleMoments.ts";
import { selectOrder } from "../../lib/autoregression/selectOrder.ts";
import { withR } from "../support/r.ts";

const r = withR();

function expectPrinted(got: ArrayLike<number>, printed: readonly number[], half: number): void {
  expect(got).toHaveLength(printed.length);
  printed.forEach((value, i) => {
    expect(Math.abs(got[i] - value)).toBeLessThanOrEqual(half);
  });
}

// Numbers as R's help pages ?ar and ?arima print them for the series lh and presidents (four decimals).
describe("R's help pages", () => {
  it("ar(lh) chooses order 3 by Yule–Walker and by Burg", async () => {
    const lh = await r.evaluate("lh");
    const yuleWalker = selectOrder(lh, { maxOrder: 16, criterion: "aic", method: "yule-walker" });
    expectPrinted(yuleWalker.fit.coefficients, [0.6534, -0.0636, -0.2269], 0.51e-4);
    const burg = selectOrder(lh, { maxOrder: 16, criterion: "aic", method: "burg" });
    expectPrinted(burg.fit.coefficients, [0.6588, -0.0608, -0.2234], 0.51e-4);
    expectPrinted([burg.fit.innovationVariance], [0.1786], 0.51e-4);
  });

  it("arima(lh, order = c(1, 0, 0)) and c(3, 0, 0)", async () => {
    const lh = await r.evaluate("lh");
    const one = fitAutoregression(lh, { order: 1, method: "maximum-likelihood" });
    const printed = [...one.coefficients, one.mean, ...one.standardErrors, one.meanStandardError];
    expectPrinted(printed, [0.5739, 2.4133, 0.1161, 0.1466], 1.5e-4);
    expectPrinted([one.logLikelihood, one.aic], [-29.38, 64.76], 0.006);
    const three = fitAutoregression(lh, { order: 3, method: "maximum-likelihood" });
    expectPrinted([...three.coefficients, three.mean], [0.6448, -0.0634, -0.2198, 2.3931], 1.5e-4);
    expectPrinted([three.logLikelihood, three.aic], [-27.09, 64.18], 0.006);
  });

  it("arima(presidents, c(3, 0, 0)), with its six gaps", async () => {
    const fit = fitAutoregression(await r.evaluate("presidents"), { order: 3, method: "maximum-likelihood" });
    expectPrinted(fit.coefficients, [0.7496, 0.2523, -0.189], 1.5e-4);
    expectPrinted([fit.mean, fit.meanStandardError], [56.2236, 4.2845], 0.01);
    expectPrinted([fit.logLikelihood, fit.aic], [-414.08, 838.16], 0.006);
    expect(fit.observations).toBe(114);
  });
});

// Integer Wolfer sunspot numbers 1770–1869: Box & Jenkins, Series E; moments and Yule–Walker fit as printed in
// Brockwell & Davis, Introduction to Time Series and Forecasting (from memory, and confirmed by R).
const WOLFER = [
  101, 82, 66, 35, 31, 7, 20, 92, 154, 125, 85, 68, 38, 23, 10, 24, 83, 132, 131, 118, 90, 67, 60, 47, 41, 21,
  16, 6, 4, 7, 14, 34, 45, 43, 48, 42, 28, 10, 8, 2, 0, 1, 5, 12, 14, 35, 46, 41, 30, 24, 16, 7, 4, 2, 8, 17,
  36, 50, 62, 67, 71, 48, 28, 8, 13, 57, 122, 138, 103, 86, 63, 37, 24, 11, 15, 40, 62, 98, 124, 96, 66, 64,
  54, 39, 21, 7, 4, 23, 55, 94, 96, 77, 59, 44, 47, 30, 16, 7, 37, 74,
];

describe("the Wolfer sunspot numbers in print", () => {
  it("have mean 46.93 and autocovariances 1382.2, 1114.4, 591.72, 96.215", () => {
    expectPrinted(sampleAutocovariances(WOLFER, 3), [1382.2, 1114.4, 591.72, 96.215], 0.051);
  });

  it("give the Yule–Walker AR(2) 1.318, −0.634 with variance 289.2", () => {
    const fit = fitAutoregression(WOLFER, { order: 2, method: "yule-walker" });
    expectPrinted(fit.coefficients, [1.318, -0.634], 0.6e-3);
    expectPrinted([fit.innovationVariance, fit.mean], [289.2, 46.93], 0.06);
  });
});

// Regression with AR errors on R's data: R 4.2.2 stats::arima(xreg = , method = "ML"), confirmed by an independent
// exact likelihood to eight decimals of the log-likelihood.
describe("regression with AR errors", () => {
  it("Nile with a step in 1899", async () => {
    const values = await r.evaluate("Nile");
    const regressors = [values.map(() => 1), values.map((_, t) => (t >= 28 ? 1 : 0))];
    const fit = fitAutoregression(values, { order: 1, method: "maximum-likelihood", regressors });
    expect(fit.coefficients[0]).toBeCloseTo(0.15963252798814007, 4);
    expect(fit.standardErrors[0] / 0.09862026849569829).toBeCloseTo(1, 3);
    expectPrinted(fit.regression?.coefficients ?? [], [1098.5167481983524, -249.0747649389295], 0.01);
    expectPrinted(fit.regression?.standardErrors ?? [], [27.855350422514142, 32.80372967224159], 0.01);
    expect(fit.logLikelihood).toBeCloseTo(-624.5389778595395, 6);
    expect(fit.aicc).toBeCloseTo(1257.499008350658, 5);
  });

  it("presidents with a trend a year, an AR(3) and gaps", async () => {
    const values = await r.evaluate("presidents");
    const regressors = [values.map(() => 1), values.map((_, t) => (t + 1) / 4)];
    const fit = fitAutoregression(values, { order: 3, method: "maximum-likelihood", regressors });
    expectPrinted(fit.coefficients, [0.7401666113238117, 0.2543309340132415, -0.17847809201714612], 1e-4);
    expect(fit.regression?.coefficients[1]).toBeCloseTo(-0.48245546736488604, 3);
    expect((fit.regression?.standardErrors[1] ?? 0) / 0.5035382916544724).toBeCloseTo(1, 2);
    expect(fit.logLikelihood).toBeCloseTo(-413.57651209545276, 6);
  });
});
