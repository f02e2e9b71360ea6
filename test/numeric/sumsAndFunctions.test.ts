import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { chiSquareTail, logGamma, normalProbability, upperGamma } from "../../lib/numeric/gammaFunctions.ts";
import { levinson } from "../../lib/numeric/levinson.ts";
import { minimise } from "../../lib/numeric/minimise.ts";
import { polynomialRoots } from "../../lib/numeric/polynomialRoots.ts";
import { randomNormal } from "../../lib/numeric/randomNormal.ts";
import { compensatedSum, countObserved, observedMean } from "../../lib/numeric/sums.ts";
import { withR } from "../support/r.ts";

const r = withR();

describe("sums", () => {
  it("keep what plain addition loses, in any order", () => {
    expect(compensatedSum([1e16, 1, -1e16])).toBe(1);
    expect(compensatedSum([1, 1e100, 1, -1e100])).toBe(2);
    fc.assert(
      fc.property(fc.array(fc.integer({ min: -1e9, max: 1e9 })), (values) => {
        expect(compensatedSum(values)).toBe(values.reduce((sum, value) => sum + value, 0));
      }),
    );
  });

  it("leave gaps out", () => {
    expect(compensatedSum([1, Number.NaN, 2])).toBe(3);
    expect(countObserved([1, Number.NaN, 2])).toBe(2);
    expect(observedMean([1, Number.NaN, 2])).toBe(1.5);
    expect(observedMean([])).toBeNaN();
  });
});

describe("distribution functions", () => {
  it("agree with R far into both tails", async () => {
    for (const [x, df] of [
      [0.01, 1],
      [3, 2],
      [50, 10],
      [300, 20],
      [12, 40],
      [0, 3],
    ]) {
      const [expected] = await r.evaluate(`pchisq(${x}, ${df}, lower.tail = FALSE)`);
      expect(chiSquareTail(x, df) / expected).toBeCloseTo(1, 11);
    }
    for (const z of [-8, -3, -0.5, 0, 1.96, 5]) {
      const [expected] = await r.evaluate(`pnorm(${z})`);
      expect(normalProbability(z) / expected).toBeCloseTo(1, 11);
    }
    for (const a of [0.1, 0.5, 1, 2.5, 30, 1000]) {
      const [expected] = await r.evaluate(`lgamma(${a})`);
      expect(Math.abs(logGamma(a) - expected)).toBeLessThan(1e-12 * (1 + Math.abs(expected)));
    }
  });

  it("have their ends", () => {
    expect(upperGamma(2, 0)).toBe(1);
    expect(upperGamma(2, Number.POSITIVE_INFINITY)).toBe(0);
  });
});

describe("levinson", () => {
  it("solves the Toeplitz equations that R's solve does", async () => {
    const gamma = [2, 1.2, 0.5, 0.1];
    const expected = await r.evaluate("solve(toeplitz(c(2, 1.2, 0.5)), c(1.2, 0.5, 0.1))");
    const { coefficients, innovationVariances, partials } = levinson(gamma);
    expected.forEach((value, j) => {
      expect(coefficients[2][j]).toBeCloseTo(value, 12);
    });
    expect(innovationVariances[1]).toBeCloseTo(2 * (1 - 0.36), 12);
    expect(partials[0]).toBeCloseTo(0.6, 15);
  });

  it("refuses a variance that is not positive and too few autocovariances", () => {
    expect(() => levinson([0, 0])).toThrow(/positive/);
    expect(() => levinson([1], 2)).toThrow(/3 autocovariances/);
  });
});

describe("polynomialRoots", () => {
  it("finds the roots a polynomial was made from", () => {
    const root = fc.double({ min: -2, max: 2, noNaN: true });
    fc.assert(
      fc.property(
        fc.uniqueArray(root, { minLength: 3, maxLength: 7, comparator: (a, b) => Math.abs(a - b) < 0.2 }),
        (roots) => {
          let coefficients = [1];
          for (const z of roots) {
            coefficients = [...coefficients, 0].map(
              (value, i) => value - z * (i > 0 ? coefficients[i - 1] : 0),
            );
          }
          const found = polynomialRoots(coefficients.slice(1)).map(({ re }) => re);
          const sorted = (values: number[]) => [...values].sort((a, b) => a - b);
          sorted(found).forEach((value, i) => {
            expect(value).toBeCloseTo(sorted(roots)[i], 6);
          });
        },
      ),
    );
  });

  it("takes trailing zero coefficients for roots at zero", () => {
    expect(polynomialRoots([-0.5, 0, 0])).toEqual([
      { re: 0.5, im: 0 },
      { re: 0, im: 0 },
      { re: 0, im: 0 },
    ]);
    expect(polynomialRoots([])).toEqual([]);
  });
});

describe("minimise", () => {
  it("finds the bottom of Rosenbrock's (1960) valley", () => {
    const valley = (x: Float64Array, gradient: Float64Array) => {
      const bend = x[1] - x[0] ** 2;
      gradient[0] = -400 * x[0] * bend - 2 * (1 - x[0]);
      gradient[1] = 200 * bend;
      return 100 * bend ** 2 + (1 - x[0]) ** 2;
    };
    const { point, converged } = minimise(valley, [-1.2, 1]);
    expect(converged).toBe(true);
    expect(point[0]).toBeCloseTo(1, 5);
    expect(point[1]).toBeCloseTo(1, 5);
  });

  it("stops at the side of the box when the bottom lies outside", () => {
    const slope = (x: Float64Array, gradient: Float64Array) => {
      gradient[0] = 2 * (x[0] - 5);
      gradient[1] = 2 * (x[1] - 0.5);
      return (x[0] - 5) ** 2 + (x[1] - 0.5) ** 2;
    };
    const { point } = minimise(slope, [0, 0], { bound: 2 });
    expect(point[0]).toBe(2);
    expect(point[1]).toBeCloseTo(0.5, 6);
  });
});

describe("randomNormal", () => {
  it("repeats itself for a seed and looks standard normal", () => {
    const first = randomNormal(7);
    const again = randomNormal(7);
    const other = randomNormal(8);
    const draws = Array.from({ length: 20_000 }, first);
    expect(draws.slice(0, 50)).toEqual(Array.from({ length: 50 }, again));
    expect(draws.slice(0, 50)).not.toEqual(Array.from({ length: 50 }, other));
    const moment = (power: number) => draws.reduce((sum, value) => sum + value ** power, 0) / draws.length;
    // Five standard errors: √(1/n), √(2/n), √(15/n), √(96/n).
    expect(Math.abs(moment(1))).toBeLessThan(0.036);
    expect(Math.abs(moment(2) - 1)).toBeLessThan(0.05);
    expect(Math.abs(moment(3))).toBeLessThan(0.14);
    expect(Math.abs(moment(4) - 3)).toBeLessThan(0.35);
  });
});
