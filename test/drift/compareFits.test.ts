import { describe, expect, it } from "vitest";
import { fitAutoregression } from "../../lib/autoregression/fitAutoregression.ts";
import { compareFits } from "../../lib/drift/compareFits.ts";
import { simulatedSeries } from "./simulatedSeries.ts";

const fitted = (values: number[], order = 1) => fitAutoregression(values, { order, method: "least-squares" });

describe("compareFits", () => {
  it("gives the difference the spread it has over many series whose samples overlap", () => {
    const differences: number[] = [];
    const errors: number[] = [];
    for (let seed = 0; seed < 600; seed++) {
      const series = simulatedSeries({ seed: 900 + 31 * seed, length: 240, coefficient: 0.5 });
      const [first] = compareFits(fitted(series.slice(0, 200)), fitted(series)).coefficients;
      differences.push(first.difference);
      errors.push(first.standardError ?? Number.NaN);
    }
    const spread = Math.sqrt(differences.reduce((sum, value) => sum + value * value, 0) / differences.length);
    const typical = errors.reduce((sum, value) => sum + value, 0) / errors.length;
    // The spread of 600 differences is known to 1/√1200 = 3 %; independent samples would give √(1 + 200/240)·√(240/40) ≈ 3.3 times as much.
    expect(typical / spread).toBeGreaterThan(0.9);
    expect(typical / spread).toBeLessThan(1.1);
  });

  it("does not judge a difference between two orders, nor one without new values", () => {
    const series = simulatedSeries({ seed: 5, length: 220, coefficient: 0.5 });
    const orders = compareFits(fitted(series.slice(0, 200), 1), fitted(series, 2));
    expect(orders.coefficients.map(({ standardError }) => standardError)).toEqual([null, null]);
    expect(orders.coefficients[1]).toMatchObject({ lag: 2, before: null });
    const same = compareFits(fitted(series), fitted(series));
    expect(same.coefficients[0]).toMatchObject({ difference: 0, standardError: null });
  });
});
