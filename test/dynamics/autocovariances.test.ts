import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { autocovariances } from "../../lib/dynamics/autocovariances.ts";
import { movingAverageWeights } from "../../lib/dynamics/movingAverageWeights.ts";
import { levinson } from "../../lib/numeric/levinson.ts";
import { stationaryCoefficients } from "../support/arbitraryProcess.ts";
import { withR } from "../support/r.ts";

const r = withR();

describe("autocovariances", () => {
  it("of an AR(1) are σ²/(1 − φ²) and fall by φ a lag, also at φ = 0.9999", () => {
    for (const phi of [0.5, -0.6, 0.999, 0.9999]) {
      const gamma = autocovariances([phi], 2, 5);
      expect(gamma[0] / (2 / ((1 - phi) * (1 + phi)))).toBeCloseTo(1, 12);
      for (let j = 1; j <= 5; j++) expect(gamma[j] / gamma[j - 1]).toBeCloseTo(phi, 12);
    }
  });

  it("satisfy the Yule–Walker equations of any order, lag 0 included", () => {
    fc.assert(
      fc.property(stationaryCoefficients(6, 0.9), (coefficients) => {
        const gamma = autocovariances(coefficients, 1, 10);
        for (let k = 0; k <= 10; k++) {
          let sum = k === 0 ? 1 : 0;
          for (let j = 1; j <= coefficients.length; j++) sum += coefficients[j - 1] * gamma[Math.abs(k - j)];
          expect(Math.abs(gamma[k] - sum)).toBeLessThan(1e-10 * gamma[0]);
        }
      }),
    );
  });

  it("are σ² Σ ψ_i ψ_{i+k}", () => {
    const weights = movingAverageWeights([0.6, -0.3, 0.1], 400);
    const gamma = autocovariances([0.6, -0.3, 0.1], 1, 4);
    for (let k = 0; k <= 4; k++) {
      let sum = 0;
      for (let i = 0; i + k < 400; i++) sum += weights[i] * weights[i + k];
      expect(gamma[k]).toBeCloseTo(sum, 12);
    }
  });

  it("give the coefficients back through the Levinson recursion", () => {
    fc.assert(
      fc.property(stationaryCoefficients(5, 0.9), (coefficients) => {
        const order = coefficients.length;
        const back = levinson(autocovariances(coefficients, 1, order));
        coefficients.forEach((value, j) => {
          expect(back.coefficients[order - 1][j]).toBeCloseTo(value, 8);
        });
        expect(back.innovationVariances[order]).toBeCloseTo(1, 8);
      }),
    );
  });

  it("have the shape of R's ARMAacf", async () => {
    for (const coefficients of [[0.7], [1.34, -0.65], [0.6, -0.1, -0.2], [0.3, 0.2, 0.2, 0.1]]) {
      const gamma = autocovariances(coefficients, 1, 15);
      const expected = await r.evaluate(`ARMAacf(c(${coefficients.join(",")}), lag.max = 15)`);
      expected.forEach((value, k) => {
        expect(gamma[k] / gamma[0]).toBeCloseTo(value, 10);
      });
    }
  });
});
