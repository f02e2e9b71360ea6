import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { fitAutoregression } from "../../lib/autoregression/fitAutoregression.ts";
import { halfLife } from "../../lib/dynamics/halfLife.ts";
import { halfLifeInterval } from "../../lib/dynamics/halfLifeInterval.ts";
import { movingAverageWeights } from "../../lib/dynamics/movingAverageWeights.ts";
import { simulate, stationaryCoefficients } from "../support/arbitraryProcess.ts";

describe("halfLife", () => {
  it("of an AR(1) lies within a period of ln ½/ln φ, and below it where the line cuts the curve", () => {
    for (const phi of [0.6, 0.8, 0.9, 0.99, 0.999, 0.99999]) {
      const exact = Math.log(0.5) / Math.log(phi);
      expect(Math.abs(halfLife([phi]) - exact)).toBeLessThan(0.1);
    }
    expect(halfLife([0.5])).toBeCloseTo(1, 14);
  });

  it("of no dependence at all is half a period, by the straight line from 1 to 0", () => {
    expect(halfLife([])).toBe(0.5);
    expect(halfLife([0])).toBe(0.5);
  });

  it("is the last crossing: no later weight is above one half, the one before is", () => {
    fc.assert(
      fc.property(stationaryCoefficients(5, 0.9), (coefficients) => {
        const life = halfLife(coefficients);
        const weights = movingAverageWeights(coefficients, 20_000).map(Math.abs);
        const last = weights.findLastIndex((weight) => weight > 0.5);
        expect(Math.ceil(life)).toBe(last + 1);
        expect(life).toBeGreaterThanOrEqual(last);
      }),
    );
  });

  it("waits for the last swing of a cycle", () => {
    // A damped cycle of length 4: ψ = 1, 0, −0.81, 0, 0.656, 0, −0.531, 0, 0.43 …
    expect(halfLife([0, -0.81])).toBeCloseTo(6 + (0.81 ** 3 - 0.5) / 0.81 ** 3, 10);
  });

  it("follows the slowest root where walking would take too long", () => {
    expect(halfLife([0.9999999]) / (Math.log(0.5) / Math.log(0.9999999))).toBeCloseTo(1, 9);
    // A complex pair of modulus r: to within one cycle of ln ½/ln r, the swings starting near size one.
    const modulus = 0.999999;
    const life = halfLife([2 * modulus * Math.cos(1.2), -(modulus ** 2)]);
    expect(life / (Math.log(0.5 * Math.sin(1.2)) / Math.log(modulus))).toBeCloseTo(1, 4);
  });

  it("is infinite when shocks are permanent or grow", () => {
    expect(halfLife([1])).toBe(Number.POSITIVE_INFINITY);
    expect(halfLife([0.5, 0.5])).toBe(Number.POSITIVE_INFINITY);
    expect(halfLife([1.1])).toBe(Number.POSITIVE_INFINITY);
  });
});

describe("halfLifeInterval", () => {
  it("holds the true half-life in about nine of ten series", () => {
    let held = 0;
    for (let seed = 1; seed <= 100; seed++) {
      const fit = fitAutoregression(simulate([0.8], 100, seed), { order: 1, method: "burg" });
      const { low, high } = halfLifeInterval(fit);
      if (low <= halfLife([0.8]) && halfLife([0.8]) <= high) held++;
    }
    // Nominal 90; three standard deviations of a binomial count either way.
    expect(held).toBeGreaterThanOrEqual(81);
    expect(held).toBeLessThanOrEqual(99);
  });

  it("has no upper end when a unit root cannot be ruled out", () => {
    const walk = fitAutoregression(simulate([0.999], 60, 4), { order: 1, method: "burg" });
    expect(halfLifeInterval(walk).high).toBe(Number.POSITIVE_INFINITY);
  });

  it("corrects upwards: the half-life that least squares sees is too short", () => {
    const fit = { coefficients: [0.8], observations: 50 };
    // (nφ̂ + 1)/(n − 3) = 41/47, after Kendall (1954).
    expect(halfLifeInterval(fit).corrected).toBeCloseTo(halfLife([41 / 47]), 10);
  });

  it("gives the same range for the same seed, and says nothing of very short series", () => {
    const fit = { coefficients: [0.5, 0.2], observations: 80 };
    expect(halfLifeInterval(fit, { seed: 5 })).toEqual(halfLifeInterval(fit, { seed: 5 }));
    expect(halfLifeInterval({ ...fit, observations: 9 })).toMatchObject({
      low: 0,
      high: Number.POSITIVE_INFINITY,
    });
  });

  it("survives a fit that is not stationary", () => {
    const { low, high } = halfLifeInterval({ coefficients: [1.05], observations: 40 });
    expect(low).toBeGreaterThan(0);
    expect(high).toBe(Number.POSITIVE_INFINITY);
  });
});
