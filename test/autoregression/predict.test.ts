import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { predict } from "../../lib/autoregression/predict.ts";
import { smoothGaps } from "../../lib/autoregression/smoothGaps.ts";
import { autocovariances } from "../../lib/dynamics/autocovariances.ts";
import { movingAverageWeights } from "../../lib/dynamics/movingAverageWeights.ts";
import { simulate, stationaryCoefficients, withGaps } from "../support/arbitraryProcess.ts";

const gaps = fc.array(fc.nat(24), { maxLength: 22 });

describe("predict", () => {
  it("has variance σ² Σ ψ² where the last p values are known", () => {
    fc.assert(
      fc.property(stationaryCoefficients(), fc.nat(1000), (coefficients, seed) => {
        const process = { coefficients, mean: 3, innovationVariance: 2 };
        const { standardErrors } = predict(process, simulate(coefficients, 20, seed), { horizon: 6 });
        const weights = movingAverageWeights(coefficients, 6);
        let variance = 0;
        for (let h = 0; h < 6; h++) {
          variance += 2 * weights[h] ** 2;
          expect(standardErrors[h] ** 2).toBeCloseTo(variance, 8);
        }
      }),
    );
  });

  it("agrees with smoothing the same series with gaps put at its end, which is solved in another way", () => {
    fc.assert(
      fc.property(stationaryCoefficients(4, 0.9), gaps, fc.nat(1000), (coefficients, places, seed) => {
        const values = withGaps(simulate(coefficients, 25, seed), places);
        if (values.every(Number.isNaN)) return;
        const process = { coefficients, mean: -1, innovationVariance: 0.5 };
        const ahead = predict(process, values, { horizon: 5 });
        const extended = smoothGaps(process, [...values, ...new Array(5).fill(Number.NaN)]);
        for (let h = 0; h < 5; h++) {
          expect(ahead.mean[h]).toBeCloseTo(extended.values[25 + h], 8);
          expect(ahead.standardErrors[h]).toBeCloseTo(extended.standardErrors[25 + h], 7);
        }
      }),
    );
  });

  it("gives the total the variance of a sum of correlated errors", () => {
    // AR(1) by hand: errors ε1, φε1 + ε2, so the total's variance is σ²((1 + φ)² + 1).
    const process = { coefficients: [0.5], mean: 10, innovationVariance: 4 };
    const { total } = predict(process, [12], { horizon: 2 });
    expect(total.mean).toBeCloseTo(21.5, 12);
    expect(total.standardError ** 2).toBeCloseTo(4 * (1.5 ** 2 + 1), 12);
  });

  it("starts after the last row, observed or not", () => {
    const process = { coefficients: [0.5], mean: 0, innovationVariance: 1 };
    const ahead = predict(process, [8, Number.NaN, Number.NaN], { horizon: 1 });
    expect(ahead.mean[0]).toBeCloseTo(1, 12); // 8·φ³
    expect(ahead.standardErrors[0] ** 2).toBeCloseTo(1 + 0.25 + 0.0625, 12);
  });

  it("goes back to the long-run mean and variance", () => {
    const process = { coefficients: [0.6, -0.2], mean: 7, innovationVariance: 1 };
    const far = predict(process, [9, 1, 5], { horizon: 200 });
    expect(far.mean[199]).toBeCloseTo(7, 10);
    expect(far.standardErrors[199] ** 2).toBeCloseTo(autocovariances([0.6, -0.2], 1, 0)[0], 10);
  });

  it("continues a process that is not stationary from the values that are known", () => {
    const walk = { coefficients: [1], mean: 0, innovationVariance: 1 };
    const ahead = predict(walk, [1, 5], { horizon: 3 });
    expect(Array.from(ahead.mean)).toEqual([5, 5, 5]);
    expect(ahead.standardErrors[2] ** 2).toBeCloseTo(3, 12);
    expect(() => predict(walk, [Number.NaN], { horizon: 1 })).toThrow(/stationary/);
  });

  it("refuses a horizon below one and a variance that is not positive", () => {
    const process = { coefficients: [0.5], mean: 0, innovationVariance: 1 };
    expect(() => predict(process, [1], { horizon: 0 })).toThrow(/horizon/);
    expect(() => predict({ ...process, innovationVariance: 0 }, [1], { horizon: 1 })).toThrow(
      /innovationVariance/,
    );
  });
});

describe("smoothGaps", () => {
  it("fills a gap of an AR(1) with φ/(1 + φ²) of its neighbours, variance σ²/(1 + φ²)", () => {
    const process = { coefficients: [0.5], mean: 0, innovationVariance: 1 };
    const { values, standardErrors } = smoothGaps(process, [2, Number.NaN, 2]);
    expect(values[1]).toBeCloseTo(1.6, 12);
    expect(standardErrors[1] ** 2).toBeCloseTo(0.8, 12);
    expect(standardErrors[0]).toBe(0);
  });

  it("bridges a gap longer than the series around it", () => {
    const values = new Float64Array(1000).fill(Number.NaN);
    values[0] = 1;
    values[999] = -1;
    const process = { coefficients: [0.9], mean: 0, innovationVariance: 1 };
    const smooth = smoothGaps(process, values);
    expect(smooth.values[500]).toBeCloseTo(0, 10);
    expect(smooth.standardErrors[500] ** 2).toBeCloseTo(1 / 0.19, 8);
    expect(smooth.values[1]).toBeCloseTo(0.9, 10);
  });
});
