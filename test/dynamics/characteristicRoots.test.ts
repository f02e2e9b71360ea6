import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { characteristicRoots, rhythm } from "../../lib/dynamics/characteristicRoots.ts";
import { longRun, spectralDensity } from "../../lib/dynamics/longRun.ts";
import { cumulativeResponse, persistence } from "../../lib/dynamics/persistence.ts";
import { polynomialRoots } from "../../lib/numeric/polynomialRoots.ts";
import { stationaryCoefficients } from "../support/arbitraryProcess.ts";
import { withR } from "../support/r.ts";

const r = withR();

describe("characteristicRoots", () => {
  it("are the inverses of R's polyroot of 1 − φ_1 z − …, largest first", async () => {
    for (const coefficients of [
      [0.5],
      [1.34, -0.65],
      [0.6, -0.1, -0.2],
      [0.3, 0.2, 0.2, 0.2, 0.09],
      [0, 0, 0, 0.98],
    ]) {
      const code = `1 / Mod(polyroot(c(1, ${coefficients.map((value) => -value).join(",")})))`;
      const expected = (await r.evaluate(code)).sort((a, b) => b - a);
      characteristicRoots(coefficients).forEach((root, i) => {
        expect(root.modulus).toBeCloseTo(expected[i], 8);
      });
    }
  });

  it("multiply up to the last coefficient and add up to the first", () => {
    fc.assert(
      fc.property(stationaryCoefficients(8, 0.9), (coefficients) => {
        const roots = polynomialRoots(Array.from(coefficients, (value) => -value));
        const sum = roots.reduce((total, root) => total + root.re, 0);
        expect(sum).toBeCloseTo(coefficients[0], 8);
        const product = characteristicRoots(coefficients).reduce((total, root) => total * root.modulus, 1);
        expect(product).toBeCloseTo(Math.abs(coefficients[coefficients.length - 1]), 8);
      }),
    );
  });

  it("of a seasonal autoregression lie evenly on a circle", () => {
    const coefficients = new Float64Array(12);
    coefficients[11] = 0.9;
    for (const root of characteristicRoots(coefficients))
      expect(root.modulus).toBeCloseTo(0.9 ** (1 / 12), 10);
  });

  it("tell a negative real root by period 2 and a positive one by none", () => {
    expect(characteristicRoots([0, 0.25])).toEqual([
      { modulus: 0.5, period: Number.POSITIVE_INFINITY },
      { modulus: 0.5, period: 2 },
    ]);
  });
});

describe("rhythm", () => {
  // Yule (1927), Phil. Trans. R. Soc. A 226: sunspots 1749–1924, coefficients 1.34254 and −0.65504, period 10.60 years.
  it("is 10.60 years for Yule's sunspot numbers", () => {
    expect(rhythm([1.34254, -0.65504])?.period).toBeCloseTo(10.6, 2);
    expect(rhythm([1.34254, -0.65504])?.damping).toBeCloseTo(Math.sqrt(0.65504), 12);
  });

  it("is absent where all roots are real, also where three are equal", () => {
    expect(rhythm([1.5, -0.75, 0.125])).toBeUndefined();
    expect(rhythm([0.5, 0.3])).toBeUndefined();
    expect(rhythm([1.2, -0.36])).toBeUndefined();
  });
});

describe("the long run", () => {
  it("has the closed forms of an AR(1)", () => {
    const settled = longRun({ coefficients: [0.5], mean: 10, innovationVariance: 1 });
    expect(settled.level).toBe(10);
    expect(settled.variance).toBeCloseTo(4 / 3, 12);
    expect(settled.varianceOfMean).toBeCloseTo(4, 12);
    expect(persistence([0.5, 0.3])).toBeCloseTo(0.8, 15);
    expect(cumulativeResponse([0.5])).toBe(2);
  });

  it("is nowhere when shocks are permanent", () => {
    expect(longRun({ coefficients: [1], mean: 0, innovationVariance: 1 }).variance).toBe(
      Number.POSITIVE_INFINITY,
    );
    expect(cumulativeResponse([1])).toBe(Number.POSITIVE_INFINITY);
  });

  it("has a spectrum whose integral is the variance", () => {
    const coefficients = [0.6, -0.1, -0.2];
    let sum = 0;
    for (let k = 0; k < 4096; k++) sum += spectralDensity(coefficients, 1, (k + 0.5) / 4096) / 4096;
    expect(sum).toBeCloseTo(longRun({ coefficients, mean: 0, innovationVariance: 1 }).variance, 10);
  });
});
