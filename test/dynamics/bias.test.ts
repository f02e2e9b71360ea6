import { describe, expect, it } from "vitest";
import { fitAutoregression } from "../../lib/autoregression/fitAutoregression.ts";
import { biasCorrected, firstOrderBias } from "../../lib/dynamics/firstOrderBias.ts";
import {
  coefficientInterval,
  leastSquaresMean,
  leastSquaresProbability,
  leastSquaresQuantile,
  medianUnbiased,
} from "../../lib/dynamics/leastSquaresDistribution.ts";
import { simulate } from "../support/arbitraryProcess.ts";

describe("firstOrderBias", () => {
  it("of an AR(1) is Kendall's −(1 + 3φ)/n, −2φ/n with a known mean, −(2 + 4φ)/n with a trend", () => {
    for (const phi of [-0.5, 0, 0.8, 0.99]) {
      expect(firstOrderBias([phi], 50, "estimate")[0]).toBeCloseTo(-(1 + 3 * phi) / 50, 14);
      expect(firstOrderBias([phi], 50, "zero")[0]).toBeCloseTo((-2 * phi) / 50, 14);
      expect(firstOrderBias([phi], 50, "trend")[0]).toBeCloseTo(-(2 + 4 * phi) / 50, 14);
    }
  });

  it("of an AR(2) is that of Shaman & Stine (1988)", () => {
    // Known mean: −φ1, −(1 + 3φ2); estimated: −(φ1 + 1 + φ2), −(2 + 4φ2), over n. Formulas from memory.
    const known = firstOrderBias([0.5, 0.3], 100, "zero");
    const estimated = firstOrderBias([0.5, 0.3], 100, "estimate");
    expect(Array.from(known)).toEqual([expect.closeTo(-0.005, 12), expect.closeTo(-0.019, 12)]);
    expect(Array.from(estimated)).toEqual([expect.closeTo(-0.018, 12), expect.closeTo(-0.032, 12)]);
  });

  it("of an AR(4) is what simulated least squares shows", () => {
    const coefficients = [0.5, -0.3, 0.2, 0.2];
    const bias = firstOrderBias(coefficients, 100, "estimate");
    const sums = new Float64Array(4);
    const replications = 4000;
    for (let seed = 1; seed <= replications; seed++) {
      const fit = fitAutoregression(simulate(coefficients, 100, seed), { order: 4, method: "least-squares" });
      for (let j = 0; j < 4; j++) sums[j] += (fit.coefficients[j] - coefficients[j]) / replications;
    }
    // Standard error of each mean is about 0.1/√4000 = 0.0016; terms of order 1/n² are about as large.
    for (let j = 0; j < 4; j++) expect(Math.abs(sums[j] - bias[j])).toBeLessThan(0.007);
  });
});

describe("biasCorrected", () => {
  it("solves φ + bias(φ) = φ̂, for AR(1) with a mean (nφ̂ + 1)/(n − 3)", () => {
    expect(biasCorrected([0.5859869716709591], 48, "estimate")[0]).toBeCloseTo(
      (48 * 0.5859869716709591 + 1) / 45,
      12,
    );
    const estimate = [0.6, -0.2, 0.1];
    const corrected = biasCorrected(estimate, 80, "estimate");
    const bias = firstOrderBias(corrected, 80, "estimate");
    for (let j = 0; j < 3; j++) expect(corrected[j] + bias[j]).toBeCloseTo(estimate[j], 12);
  });

  it("may leave the stationary region, and needs enough observations", () => {
    expect(biasCorrected([0.98], 50, "estimate")[0]).toBeGreaterThan(1);
    expect(() => biasCorrected([0.5], 4, "estimate")).toThrow(/more than 4/);
  });
});

describe("the exact distribution of the least-squares AR(1) estimate", () => {
  // Exact moments by an independent quadrature over eigenvalues of the quadratic forms, to six decimals.
  it("has mean and median as other ways of computing them give", () => {
    expect(leastSquaresMean(0.8, 50, "estimate")).toBeCloseTo(0.7276425701338748, 6);
    expect(leastSquaresMean(0.8, 50, "zero")).toBeCloseTo(0.7703403493738002, 6);
    expect(leastSquaresMean(0.99, 200, "estimate")).toBeCloseTo(0.9657184664088082, 6);
    expect(leastSquaresQuantile(0.95, 100, 0.5)).toBeCloseTo(0.915717744827983, 6);
    expect(leastSquaresQuantile(-0.5, 50, 0.5)).toBeCloseTo(-0.5006744075291226, 6);
  });

  it("agrees with simulation in its tails", () => {
    const below = { low: 0, high: 0 };
    const replications = 4000;
    for (let seed = 1; seed <= replications; seed++) {
      const fit = fitAutoregression(simulate([0.9], 60, seed), { order: 1, method: "least-squares" });
      if (fit.coefficients[0] <= 0.7) below.low++;
      if (fit.coefficients[0] <= 0.93) below.high++;
    }
    // Four standard errors of a share of 4000 are at most 0.032.
    expect(
      Math.abs(below.low / replications - leastSquaresProbability(0.9, 60, 0.7, "estimate")),
    ).toBeLessThan(0.03);
    expect(
      Math.abs(below.high / replications - leastSquaresProbability(0.9, 60, 0.93, "estimate")),
    ).toBeLessThan(0.03);
  });

  it("makes the median-unbiased estimate of Andrews (1993)", () => {
    expect(medianUnbiased(0.8, 50)).toBeCloseTo(0.8622180406756692, 5);
    expect(medianUnbiased(0.9, 100)).toBeCloseTo(0.9328978458394227, 5);
    expect(leastSquaresQuantile(medianUnbiased(0.7, 40), 40, 0.5)).toBeCloseTo(0.7, 7);
    expect(medianUnbiased(0.99, 50)).toBe(1);
  });

  it("has an interval whose ends make the estimate as rare as the level says", () => {
    const { low, high } = coefficientInterval(0.6, 60, 90);
    expect(leastSquaresQuantile(low, 60, 0.95)).toBeCloseTo(0.6, 7);
    expect(leastSquaresQuantile(high, 60, 0.05)).toBeCloseTo(0.6, 7);
    expect(low).toBeLessThan(medianUnbiased(0.6, 60));
    expect(coefficientInterval(0.95, 60, 90).high).toBe(1);
    expect(() => coefficientInterval(0.6, 60, 100)).toThrow(/level/);
  });

  it("refuses a coefficient outside (−1, 1)", () => {
    expect(() => leastSquaresMean(1, 50, "estimate")).toThrow(/phi/);
  });
});
