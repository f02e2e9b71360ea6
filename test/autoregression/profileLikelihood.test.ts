import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { likelihoodDesign } from "../../lib/autoregression/likelihoodDesign.ts";
import { logLikelihood } from "../../lib/autoregression/logLikelihood.ts";
import { ProfileLikelihood } from "../../lib/autoregression/profileLikelihood.ts";
import { trendColumn } from "../../lib/autoregression/regressionTerms.ts";
import { simulate, withGaps } from "../support/arbitraryProcess.ts";

const points = fc.array(fc.double({ min: -1.5, max: 1.5, noNaN: true }), { minLength: 1, maxLength: 5 });
const gaps = fc.array(fc.nat(39), { maxLength: 25 });
const seeds = fc.nat(1000);

function likelihoodOf(places: readonly number[], order: number, seed: number, columns: ArrayLike<number>[]) {
  const values = withGaps(simulate([0.5, 0.3], 40, seed), places);
  const design = likelihoodDesign(values, columns);
  return { values, design, likelihood: new ProfileLikelihood(design, order) };
}

describe("ProfileLikelihood", () => {
  it("differs between two points by what the exact likelihood at the profiled parameters differs", () => {
    const deviance = (places: readonly number[], point: readonly number[], seed: number) => {
      const { values, design, likelihood } = likelihoodOf(places, point.length, seed, []);
      const value = likelihood.valueAt(Float64Array.from(point));
      const variance = (likelihood.sumOfSquares / design.observations) * design.scale ** 2;
      const coefficients = likelihood.u.slice(1).map((entry) => -entry);
      const process = { coefficients, mean: 0, innovationVariance: variance };
      return value + 2 * logLikelihood(values, process).logLikelihood;
    };
    fc.assert(
      fc.property(points, gaps, seeds, (point, places, seed) => {
        const origin = point.map(() => 0);
        expect(deviance(places, point, seed)).toBeCloseTo(deviance(places, origin, seed), 6);
      }),
    );
  });

  it.each([
    ["a complete series", false, false],
    ["gaps", true, false],
    ["regressors", false, true],
    ["gaps and regressors", true, true],
  ])("has the gradient that central differences give, with %s", (_, withHoles, withColumns) => {
    fc.assert(
      fc.property(points, gaps, seeds, (point, holes, seed) => {
        const columns = withColumns ? [new Float64Array(40).fill(1), trendColumn(40)] : [];
        const { likelihood } = likelihoodOf(withHoles ? holes : [], point.length, seed, columns);
        const at = Float64Array.from(point);
        const gradient = new Float64Array(point.length);
        likelihood.evaluate(at, gradient);
        for (let i = 0; i < point.length; i++) {
          const moved = Float64Array.from(at);
          moved[i] = at[i] + 1e-5;
          const above = likelihood.valueAt(moved);
          moved[i] = at[i] - 1e-5;
          const slope = (above - likelihood.valueAt(moved)) / 2e-5;
          expect(Math.abs(gradient[i] - slope)).toBeLessThan(1e-4 * (1 + Math.abs(slope)));
        }
      }),
    );
  });
});
