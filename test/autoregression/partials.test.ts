import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  coefficientsToPartials,
  isStationary,
  partialsToCoefficients,
} from "../../lib/autoregression/partials.ts";
import { characteristicRoots } from "../../lib/dynamics/characteristicRoots.ts";

const partials = fc.array(fc.double({ min: -0.95, max: 0.95, noNaN: true }), { minLength: 1, maxLength: 6 });

describe("partial autocorrelations and coefficients", () => {
  // Durbin's recursion by hand: 0.5(1 + 0.3) + 0.2·0.3 …
  it("turn into each other as the recursion says", () => {
    const coefficients = partialsToCoefficients([0.5, -0.3, 0.2]);
    [0.71, -0.43, 0.2].forEach((value, j) => {
      expect(coefficients[j]).toBeCloseTo(value, 14);
    });
  });

  it("come back from a round trip", () => {
    fc.assert(
      fc.property(partials, (given) => {
        const back = coefficientsToPartials(partialsToCoefficients(given));
        given.forEach((value, k) => {
          expect(back[k]).toBeCloseTo(value, 7);
        });
      }),
    );
  });

  it("of size below one always make a stationary process, by its roots", () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -0.9, max: 0.9, noNaN: true }), { minLength: 1, maxLength: 6 }),
        (given) => {
          const [largest] = characteristicRoots(partialsToCoefficients(given));
          expect(largest.modulus).toBeLessThan(1);
        },
      ),
    );
  });

  it("leave the edge of the AR(2) triangle outside the stationary region", () => {
    // Box & Jenkins (1976), section 3.2.4: φ2 + φ1 < 1, φ2 − φ1 < 1, |φ2| < 1.
    for (const edge of [
      [2, -1],
      [0, 1],
      [1, 0],
      [0.5, 0.5],
      [-0.5, 0.5],
      [1.999999, -0.999998],
    ]) {
      expect(isStationary(edge)).toBe(false);
    }
    for (const inside of [
      [0, 0.999],
      [1, -0.5],
      [1.5, -0.500001],
      [1.8, -0.82],
    ]) {
      expect(isStationary(inside)).toBe(true);
    }
  });

  it("refuse coefficients that are not stationary", () => {
    expect(() => coefficientsToPartials([1.02])).toThrow(/stationary/);
  });
});
