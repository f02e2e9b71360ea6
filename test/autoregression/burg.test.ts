import { describe, expect, it } from "vitest";
import { burgAllOrders, burgWorkspace } from "../../lib/autoregression/burg.ts";
import { fitAutoregression } from "../../lib/autoregression/fitAutoregression.ts";
import { observedMean } from "../../lib/numeric/sums.ts";
import { simulate } from "../support/arbitraryProcess.ts";
import { withR } from "../support/r.ts";

const r = withR();

describe("burgAllOrders", () => {
  it("leaves in row k what a fit of order k + 1 has, and can be used again", () => {
    const workspace = burgWorkspace(200, 8);
    for (const seed of [1, 2]) {
      const values = simulate([0.5, -0.3], seed === 1 ? 200 : 90, seed);
      burgAllOrders(values, observedMean(values), 8, workspace);
      for (let order = 1; order <= 8; order++) {
        const fit = fitAutoregression(values, { order, method: "burg" });
        const row = workspace.coefficients.subarray((order - 1) * 8, (order - 1) * 8 + order);
        for (let j = 0; j < order; j++) expect(row[j]).toBeCloseTo(fit.coefficients[j], 12);
        expect(workspace.innovationVariances[order]).toBeCloseTo(fit.innovationVariance, 12);
      }
    }
  });

  it("keeps its digits where nearly everything is predicted: a sine with noise of a millionth", async () => {
    const noise = simulate([], 120, 3);
    const values = noise.map((value, t) => Math.sin(0.7 * t) + 1e-6 * value);
    await r.assign("x", values);
    for (let order = 1; order <= 6; order++) {
      const fit = fitAutoregression(values, { order, method: "burg", mean: "zero" });
      const expected = await r.evaluate(`ar.burg(x, FALSE, ${order}, demean = FALSE)$ar`);
      expected.forEach((value, j) => {
        expect(Math.abs(fit.coefficients[j] - value)).toBeLessThan(1e-5);
      });
    }
  });

  it("finds 2 cos ω and −1 in a sine, up to the bias of a finite stretch", () => {
    // R 4.2.2: ar.burg of sin(0.5 + …) with 48 values gives a reflection of −0.99998; the exact rule has −1.
    const values = Float64Array.from({ length: 400 }, (_, t) => Math.sin(0.5 * t));
    const { coefficients } = fitAutoregression(values, { order: 2, method: "burg", mean: "zero" });
    expect(coefficients[0]).toBeCloseTo(2 * Math.cos(0.5), 2);
    expect(coefficients[1]).toBeCloseTo(-1, 4);
  });
});
