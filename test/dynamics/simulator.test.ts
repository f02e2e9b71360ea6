import { describe, expect, it } from "vitest";
import { autocovariances } from "../../lib/dynamics/autocovariances.ts";
import { simulator } from "../../lib/dynamics/simulator.ts";
import { randomNormal } from "../../lib/numeric/randomNormal.ts";

describe("simulator", () => {
  it("draws from the stationary distribution from the first value on", () => {
    const coefficients = Float64Array.of(0.6, -0.3, 0.2);
    const gamma = autocovariances(coefficients, 1, 3);
    const draw = simulator(coefficients);
    const normal = randomNormal(5);
    const shocks = new Float64Array(6);
    const series = new Float64Array(6);
    const draws = 20_000;
    const products = new Float64Array(4);
    let late = 0;
    for (let i = 0; i < draws; i++) {
      for (let t = 0; t < 6; t++) shocks[t] = normal();
      draw(series, shocks);
      for (let lag = 0; lag <= 3; lag++) products[lag] += (series[0] * series[lag]) / draws;
      late += series[5] ** 2 / draws;
    }
    // A mean of 20,000 products has a standard error of at most γ_0 √(2/20,000); five of them.
    const error = 5 * gamma[0] * Math.sqrt(2 / draws);
    for (let lag = 0; lag <= 3; lag++) expect(Math.abs(products[lag] - gamma[lag])).toBeLessThan(error);
    expect(Math.abs(late - gamma[0])).toBeLessThan(error);
  });

  it("refuses a process that is not stationary", () => {
    expect(() => simulator(Float64Array.of(1))).toThrow(/stationary/);
  });
});
