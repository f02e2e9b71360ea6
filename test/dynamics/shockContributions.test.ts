import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { predict } from "../../lib/autoregression/predict.ts";
import { movingAverageWeights } from "../../lib/dynamics/movingAverageWeights.ts";
import { shockContributions } from "../../lib/dynamics/shockContributions.ts";
import { simulate, stationaryCoefficients, withGaps } from "../support/arbitraryProcess.ts";

const gaps = fc.array(fc.nat(38), { maxLength: 15 });

describe("shockContributions", () => {
  it("adds up to the forecast, step by step, gaps or not", () => {
    fc.assert(
      fc.property(stationaryCoefficients(4, 0.95), gaps, fc.nat(1000), (coefficients, places, seed) => {
        const values = withGaps(simulate(coefficients, 40, seed), places).map((value) => value + 5);
        const process = { coefficients, mean: 5, innovationVariance: 1 };
        const { forecast, shocks, earlier, longRunLevel } = shockContributions(process, values, {
          horizon: 6,
          last: 8,
        });
        const expected = predict(process, values, { horizon: 6 }).mean;
        for (let h = 0; h < 6; h++) {
          expect(forecast[h]).toBeCloseTo(expected[h], 8);
          const sum = shocks.reduce((total, shock) => total + shock.effects[h], longRunLevel + earlier[h]);
          expect(sum).toBeCloseTo(forecast[h], 10);
        }
      }),
    );
  });

  it("gives each shock the moving-average weight of its age", () => {
    const coefficients = [0.6, 0.2];
    const values = simulate(coefficients, 30, 8);
    const process = { coefficients, mean: 0, innovationVariance: 1 };
    const { shocks } = shockContributions(process, values, { horizon: 3, last: 5 });
    const weights = movingAverageWeights(coefficients, 10);
    shocks.forEach(({ lag, index, shock, effects }) => {
      expect(index).toBe(29 - lag);
      // ε_t by its definition.
      expect(shock).toBeCloseTo(values[index] - 0.6 * values[index - 1] - 0.2 * values[index - 2], 12);
      effects.forEach((effect, h) => {
        expect(effect).toBeCloseTo(weights[h + 1 + lag] * shock, 12);
      });
    });
  });

  it("lays the level a series started from to its first shock", () => {
    const process = { coefficients: [0.5], mean: 0, innovationVariance: 1 };
    const { shocks, earlier, forecast } = shockContributions(process, [2, 4], { horizon: 1, last: 1 });
    expect(shocks[0]).toMatchObject({ lag: 0, index: 1, shock: 3 });
    expect([shocks[0].effects[0], earlier[0], forecast[0]]).toEqual([1.5, 0.5, 2]);
  });

  it("refuses to guess gaps for a process that is not stationary", () => {
    const walk = { coefficients: [1], mean: 0, innovationVariance: 1 };
    expect(() => shockContributions(walk, [1, Number.NaN, 2], { horizon: 1, last: 1 })).toThrow(/stationary/);
    expect(shockContributions(walk, [1, 3], { horizon: 2, last: 2 }).forecast).toEqual(Float64Array.of(3, 3));
  });
});
