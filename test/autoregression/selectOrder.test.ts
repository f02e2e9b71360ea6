import { describe, expect, it } from "vitest";
import { criterionWeights, informationCriteria } from "../../lib/autoregression/criteria.ts";
import { fitAutoregression } from "../../lib/autoregression/fitAutoregression.ts";
import { selectOrder } from "../../lib/autoregression/selectOrder.ts";
import { simulate, withGaps } from "../support/arbitraryProcess.ts";
import { withR } from "../support/r.ts";

const r = withR();

describe("selectOrder", () => {
  // Maximised exact likelihoods of R's presidents (six gaps) for orders 0..6, checked against arima(method = "ML").
  const PRESIDENTS = [-474.566952139989, -416.8922732714686, -416.02289853543203, -414.0819303777023];

  it("compares exact likelihoods on the observed values, gaps or not", async () => {
    const values = await r.evaluate("presidents");
    const choice = selectOrder(values, { maxOrder: 3, criterion: "bic", method: "maximum-likelihood" });
    expect(choice.order).toBe(1);
    PRESIDENTS.forEach((logLikelihood, order) => {
      const { bic } = informationCriteria(logLikelihood, order + 2, 114);
      expect(choice.values[order]).toBeCloseTo(bic, 4);
    });
    const byAicc = selectOrder(values, { maxOrder: 6, criterion: "aicc", method: "maximum-likelihood" });
    expect(byAicc.order).toBe(3);
    expect(byAicc.fit.order).toBe(3);
  });

  it("gives every least-squares order the same rows, then fits the chosen one on all of its own", async () => {
    const values = await r.evaluate("nhtemp");
    const choice = selectOrder(values, { maxOrder: 5, criterion: "aic", method: "least-squares" });
    for (let order = 0; order <= 5; order++) {
      const lags = order > 0 ? `e[, 2:${order + 1}]` : "1";
      const [aic] = await r.evaluate(`e <- embed(as.numeric(nhtemp), 6); AIC(lm(e[, 1] ~ ${lags}))`);
      expect(choice.values[order]).toBeCloseTo(aic, 8);
    }
    const { order } = choice;
    expect(choice.fit.coefficients).toEqual(
      fitAutoregression(values, { order, method: "least-squares" }).coefficients,
    );
  });

  it("has weights that sum to one and favour the choice", () => {
    const { weights, order } = selectOrder(simulate([0.6, 0.2], 150, 3), {
      maxOrder: 8,
      criterion: "aicc",
      method: "burg",
    });
    expect(weights.reduce((sum, weight) => sum + weight, 0)).toBeCloseTo(1, 12);
    expect(weights.indexOf(Math.max(...weights))).toBe(order);
  });

  it("finds order 2 of an AR(2) by BIC from a few thousand values", () => {
    const choice = selectOrder(simulate([0.5, 0.3], 5000, 12), {
      maxOrder: 12,
      criterion: "bic",
      method: "yule-walker",
    });
    expect(choice.order).toBe(2);
  });

  it("prefers no model to one that AICc cannot afford", () => {
    const { values } = selectOrder([1, 3, 2, 4, 1, 2], { maxOrder: 4, criterion: "aicc", method: "burg" });
    expect(values[4]).toBe(Number.POSITIVE_INFINITY);
  });

  it("refuses an order that leaves no values, an unknown criterion, and gaps where the method takes none", () => {
    const values = simulate([0.5], 10, 1);
    const choose = (maxOrder: number) => () =>
      selectOrder(values, { maxOrder, criterion: "aic", method: "burg" });
    expect(choose(9)).toThrow(/11 observed/);
    expect(() => selectOrder(values, { maxOrder: 2, criterion: "x" as "aic", method: "burg" })).toThrow(
      /criterion/,
    );
    const gapped = withGaps(values, [3]);
    expect(() => selectOrder(gapped, { maxOrder: 2, criterion: "aic", method: "burg" })).toThrow(/index 3/);
  });
});

describe("informationCriteria", () => {
  it("are R's AIC and BIC, and Hurvich & Tsai's correction", async () => {
    const [logLikelihood, aic, bic] = await r.evaluate(
      `f <- arima(lh, c(1, 0, 0), method = "ML"); c(f$loglik, AIC(f), BIC(f))`,
    );
    const criteria = informationCriteria(logLikelihood, 3, 48);
    expect(criteria.aic).toBeCloseTo(aic, 10);
    expect(criteria.bic).toBeCloseTo(bic, 10);
    expect(criteria.aicc - criteria.aic).toBeCloseTo((2 * 3 * 4) / 44, 12);
  });

  it("turn into weights exp(−Δ/2), none for what is infinitely bad", () => {
    expect(Array.from(criterionWeights([10, 10, Number.POSITIVE_INFINITY]))).toEqual([0.5, 0.5, 0]);
    const [first, second] = criterionWeights([0, 2]);
    expect(second / first).toBeCloseTo(Math.exp(-1), 12);
  });
});
