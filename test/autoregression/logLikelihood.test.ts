import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { logLikelihood } from "../../lib/autoregression/logLikelihood.ts";
import { autocovariances } from "../../lib/dynamics/autocovariances.ts";
import { simulate, stationaryCoefficients, withGaps } from "../support/arbitraryProcess.ts";
import { denseLogDensity } from "../support/denseGaussian.ts";

const gaps = fc.array(fc.nat(29), { maxLength: 20 });

describe("logLikelihood", () => {
  it("is the multivariate normal density of the observed values, for any pattern of gaps", () => {
    fc.assert(
      fc.property(stationaryCoefficients(), gaps, fc.nat(1000), (coefficients, places, seed) => {
        const values = withGaps(simulate(coefficients, 30, seed), places);
        const gamma = autocovariances(coefficients, 1.7, 29);
        const mean = 0.4;
        const dense = denseLogDensity(
          values.map((value) => value - mean),
          (i, j) => gamma[Math.abs(i - j)],
        );
        const exact = logLikelihood(values, { coefficients, mean, innovationVariance: 1.7 });
        expect(exact.logLikelihood).toBeCloseTo(dense, 7);
      }),
      { numRuns: 200 },
    );
  });

  it("does not change when time is reversed", () => {
    fc.assert(
      fc.property(stationaryCoefficients(), gaps, fc.nat(1000), (coefficients, places, seed) => {
        const values = withGaps(simulate(coefficients, 30, seed), places);
        const process = { coefficients, mean: 0, innovationVariance: 1 };
        expect(logLikelihood(values.toReversed(), process).logLikelihood).toBeCloseTo(
          logLikelihood(values, process).logLikelihood,
          8,
        );
      }),
    );
  });

  it("takes a value cut off at either end for the same as a gap there", () => {
    const values = simulate([0.5, 0.2], 40, 3);
    const process = { coefficients: [0.5, 0.2], mean: 0, innovationVariance: 1 };
    const shorter = logLikelihood(values.slice(2, 37), process).logLikelihood;
    const gapped = logLikelihood(withGaps(values, [0, 1, 37, 38, 39]), process).logLikelihood;
    expect(gapped).toBeCloseTo(shorter, 10);
  });

  it("gives the first innovation the variance of the process and later ones that of a shock", () => {
    const { innovationVariances } = logLikelihood([1, 2, 3, Number.NaN, 2], {
      coefficients: [0.5],
      mean: 0,
      innovationVariance: 3,
    });
    // By hand: 3/(1 − 0.25), 3, 3, none, 3(1 + 0.25).
    expect(Array.from(innovationVariances)).toEqual([4, 3, 3, Number.NaN, 3.75]);
  });

  // R 4.2.2 and statsmodels 0.13.5 agree on this value to all digits: lh, φ = 0.57, mean 2.4, σ² = 0.2.
  it("has the value that R and statsmodels give for lh", () => {
    const lh = [
      2.4, 2.4, 2.4, 2.2, 2.1, 1.5, 2.3, 2.3, 2.5, 2, 1.9, 1.7, 2.2, 1.8, 3.2, 3.2, 2.7, 2.2, 2.2, 1.9, 1.9,
      1.8, 2.7, 3, 2.3, 2, 2, 2.9, 2.9, 2.7, 2.7, 2.3, 2.6, 2.4, 1.8, 1.7, 1.5, 1.4, 2.1, 3.3, 3.5, 3.5, 3.1,
      2.6, 2.1, 3.4, 3, 2.9,
    ];
    const exact = logLikelihood(lh, { coefficients: [0.57], mean: 2.4, innovationVariance: 0.2 });
    expect(exact.logLikelihood).toBeCloseTo(-29.385599420873035, 8);
  });

  it("refuses a process that is not stationary, and a series of gaps alone", () => {
    const unit = { coefficients: [1], mean: 0, innovationVariance: 1 };
    expect(() => logLikelihood([1, 2], unit)).toThrow(/stationary/);
    const good = { coefficients: [0.5], mean: 0, innovationVariance: 1 };
    expect(() => logLikelihood([Number.NaN], good)).toThrow(/observed/);
    expect(() => logLikelihood([Number.POSITIVE_INFINITY], good)).toThrow(/values/);
  });
});
