import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { fitAutoregression } from "../../lib/autoregression/fitAutoregression.ts";
import { isStationary } from "../../lib/autoregression/partials.ts";
import { simulate, stationaryCoefficients, withGaps } from "../support/arbitraryProcess.ts";

const METHODS = ["yule-walker", "burg", "least-squares", "maximum-likelihood"] as const;
const STATIONARY = ["yule-walker", "burg", "maximum-likelihood"] as const;
const seeds = fc.nat(10_000);

function expectNear(got: ArrayLike<number>, expected: ArrayLike<number>, tolerance: number): void {
  for (let i = 0; i < expected.length; i++) expect(Math.abs(got[i] - expected[i])).toBeLessThan(tolerance);
}

describe("every fit", () => {
  it.each(STATIONARY)("by %s is stationary, down to order + 2 values", (method) => {
    fc.assert(
      fc.property(
        stationaryCoefficients(4, 0.99),
        seeds,
        fc.integer({ min: 0, max: 30 }),
        (process, seed, more) => {
          const order = process.length;
          const values = simulate(process, order + 2 + more, seed);
          const fit = fitAutoregression(values, { order, method });
          expect(isStationary(fit.coefficients)).toBe(true);
          expect(fit.innovationVariance).toBeGreaterThanOrEqual(0);
          expect(fit.standardErrors.every(Number.isFinite)).toBe(true);
          expect(Number.isFinite(fit.mean + fit.meanStandardError)).toBe(true);
        },
      ),
      { numRuns: 150 },
    );
  });

  it.each(METHODS)("by %s moves with the scale and the origin of the values", (method) => {
    fc.assert(
      fc.property(
        seeds,
        fc.constantFrom(1e-12, 1e-3, 7, 1e12),
        fc.integer({ min: -100, max: 100 }),
        (seed, scale, shift) => {
          const values = simulate([0.6, -0.2], 60, seed);
          const moved = values.map((value) => scale * (value + shift));
          const fit = fitAutoregression(values, { order: 2, method });
          const image = fitAutoregression(moved, { order: 2, method });
          expectNear(image.coefficients, fit.coefficients, 1e-6);
          expectNear(image.standardErrors, fit.standardErrors, 1e-6);
          expect(image.mean / scale - shift).toBeCloseTo(fit.mean, 5);
          expect(image.innovationVariance / scale ** 2).toBeCloseTo(fit.innovationVariance, 7);
        },
      ),
      { numRuns: 40 },
    );
  });

  it.each(METHODS)("by %s keeps unit noise on an offset of 1e9", (method) => {
    const values = simulate([0.6, -0.2], 200, 5);
    const fit = fitAutoregression(values, { order: 2, method });
    // Doubles near 1e9 are 1e-7 apart, so the noise itself is only known to that.
    const offset = fitAutoregression(
      values.map((value) => value + 1e9),
      { order: 2, method },
    );
    expectNear(offset.coefficients, fit.coefficients, 1e-6);
    expect(offset.innovationVariance / fit.innovationVariance).toBeCloseTo(1, 6);
  });

  it.each(METHODS)("by %s refuses what it cannot use, by name", (method) => {
    const attempt = (values: number[], order: number) => fitAutoregression(values, { order, method });
    expect(() => attempt([4, 4, 4, 4, 4, 4], 1)).toThrow(/vary/);
    expect(() => attempt([2], 1)).toThrow(/observed/);
    expect(() => attempt([Number.NaN, Number.NaN, Number.NaN], 1)).toThrow(/values/);
    expect(() => attempt([1, Number.POSITIVE_INFINITY, 3, 2], 1)).toThrow(/index 1/);
    expect(() => attempt([1, 2, 3, 2], -1)).toThrow(/order/);
    expect(() => attempt([1, 2, 3, 2], 0.5)).toThrow(/order/);
  });

  it("without the exact likelihood refuses gaps unless told to use what is complete", () => {
    const values = withGaps(simulate([0.5], 50, 1), [7]);
    expect(() => fitAutoregression(values, { order: 1, method: "burg", gaps: "complete-only" })).toThrow(
      /gaps/,
    );
    expect(() => fitAutoregression(values, { order: 1, method: "least-squares" })).toThrow(/index 7/);
    const fit = fitAutoregression(values, { order: 1, method: "least-squares", gaps: "complete-only" });
    expect(fit.residuals.filter(Number.isNaN)).toHaveLength(3);
  });
});

describe("series that follow an exact rule", () => {
  const length = 60;
  const series: [string, (t: number) => number][] = [
    ["alternating", (t) => (t % 2 === 0 ? 1 : -1)],
    ["a straight line", (t) => t],
    ["a parabola", (t) => t * t],
    ["growing by a fifth", (t) => 1.2 ** t],
    ["one sine", (t) => Math.sin(0.7 * t)],
    ["two sines", (t) => Math.sin(0.7 * t) + Math.cos(1.9 * t)],
    ["a single spike", (t) => (t === 30 ? 1 : 0)],
    ["a step", (t) => (t < 30 ? 0 : 1)],
  ];
  it.each(series)("%s: every method gives numbers, or says why not", (_, rule) => {
    const values = Float64Array.from({ length }, (__, t) => rule(t));
    for (const method of METHODS) {
      for (const order of [0, 1, 2, 5]) {
        try {
          const fit = fitAutoregression(values, { order, method });
          const numbers = [fit.mean, fit.innovationVariance, fit.logLikelihood, ...fit.coefficients];
          expect(numbers.some(Number.isNaN)).toBe(false);
        } catch (error) {
          expect(error).toBeInstanceOf(RangeError);
          expect(String(error)).toMatch(/fitAutoregression needs/);
        }
      }
    }
  });

  it("keep Burg's fit inside the stationary region: two alternating values", () => {
    const values = Float64Array.from({ length }, (_, t) => (t % 2 === 0 ? 1 : -1));
    const fit = fitAutoregression(values, { order: 2, method: "burg" });
    expect(isStationary(fit.coefficients)).toBe(true);
    expect(fit.coefficients[0]).toBeCloseTo(-1, 8);
  });

  it("refuses values whose squares are no numbers", () => {
    const scaled = (size: number) => () =>
      fitAutoregression(
        [1, 3, 2, 4, 1].map((value) => value * size),
        { order: 1, method: "burg" },
      );
    expect(scaled(1e-200)).toThrow(/1e-150/);
    expect(scaled(1e200)).toThrow(/1e150/);
  });
});

describe("maximum likelihood", () => {
  it("takes a value deleted at the end for the same as a gap there", () => {
    const values = simulate([0.5, 0.2], 60, 9);
    const gapped = fitAutoregression(withGaps(values, [0, 58, 59]), {
      order: 2,
      method: "maximum-likelihood",
    });
    const shorter = fitAutoregression(values.slice(1, 58), { order: 2, method: "maximum-likelihood" });
    expectNear(gapped.coefficients, shorter.coefficients, 1e-7);
    expect(gapped.logLikelihood).toBeCloseTo(shorter.logLikelihood, 9);
    expect(gapped.observations).toBe(57);
  });

  it("finds a unit likelihood from a tenth of the values", () => {
    const values = simulate([0.9], 2000, 21);
    const few = values.map((value, t) => (t % 10 === 0 ? value : Number.NaN));
    const fit = fitAutoregression(few, { order: 1, method: "maximum-likelihood" });
    // Every tenth value of an AR(1) is an AR(1) with φ^10: the likelihoods are the same, so is the maximum.
    const thinned = fitAutoregression(
      few.filter((_, t) => t % 10 === 0),
      { order: 1, method: "maximum-likelihood" },
    );
    expect(fit.coefficients[0] ** 10).toBeCloseTo(thinned.coefficients[0], 6);
    expect(fit.logLikelihood).toBeCloseTo(thinned.logLikelihood, 7);
  });

  it("follows φ = 0.9999 without losing the likelihood", () => {
    const values = simulate([0.9999], 5000, 2);
    const fit = fitAutoregression(values, { order: 1, method: "maximum-likelihood", mean: "zero" });
    expect(fit.coefficients[0]).toBeGreaterThan(0.998);
    expect(fit.coefficients[0]).toBeLessThan(1);
    expect(fit.innovationVariance).toBeCloseTo(1, 1);
  });

  it("refuses regressors that follow from each other, or have gaps, or the wrong length", () => {
    const values = simulate([0.5], 30, 4);
    const attempt = (regressors: number[][]) =>
      fitAutoregression(values, { order: 1, method: "maximum-likelihood", regressors });
    const ones = new Array(30).fill(1);
    expect(() => attempt([ones, ones.map(() => 2)])).toThrow(/column 1/);
    expect(() => attempt([ones.with(3, Number.NaN)])).toThrow(/regressors\[0\]/);
    expect(() => attempt([[1, 2]])).toThrow(/30 entries/);
  });

  it("puts the mean where a constant column puts it", () => {
    const values = simulate([0.5], 80, 6).map((value) => value + 12);
    const mean = fitAutoregression(values, { order: 1, method: "maximum-likelihood" });
    const ones = new Float64Array(80).fill(1);
    const column = fitAutoregression(values, { order: 1, method: "maximum-likelihood", regressors: [ones] });
    expect(column.mean).toBe(0);
    expect(column.regression?.coefficients[0]).toBeCloseTo(mean.mean, 9);
    expect(column.regression?.standardErrors[0]).toBeCloseTo(mean.meanStandardError, 7);
    expect(column.logLikelihood).toBeCloseTo(mean.logLikelihood, 9);
    expect(column.aicc).toBeCloseTo(mean.aicc, 9);
  });
});
