import { describe, expect, it } from "vitest";
import { movingAverageWeights } from "../../lib/dynamics/movingAverageWeights.ts";
import { withR } from "../support/r.ts";

const r = withR();

describe("movingAverageWeights", () => {
  it("agrees with R's ARMAtoMA for orders 1 to 4", async () => {
    for (const coefficients of [[0.5], [1.34, -0.65], [0.6, -0.1, -0.2], [0.1, 0, 0, 0.8]]) {
      const expected = await r.evaluate(`ARMAtoMA(ar = c(${coefficients.join(",")}), lag.max = 30)`);
      const weights = movingAverageWeights(coefficients, 31);
      expect(weights[0]).toBe(1);
      expected.forEach((value, i) => {
        expect(weights[i + 1]).toBeCloseTo(value, 12);
      });
    }
  });

  it("gives no weight at all when none is asked for", () => {
    expect(movingAverageWeights([0.5], 0)).toHaveLength(0);
  });

  it("refuses a coefficient that is not finite, by name", () => {
    expect(() => movingAverageWeights([Number.NaN], 3)).toThrow(/coefficients/);
  });
});
