import { describe, expect, it } from "vitest";
import { argmaxCdf, argmaxQuantile } from "../../lib/drift/dateInterval.ts";
import { cumulativeNormal } from "../../lib/drift/normalLaw.ts";
import { withR } from "../support/r.ts";

const r = withR();

describe("argmaxCdf", () => {
  // strucchange 1.5.3, pargmaxV; Bai (1997) prints 7.7 for 90 % and 11.0 for 95 % two-sided.
  it.each([
    [0.5, 0.62712020686336656],
    [1, 0.69885391241535311],
    [2, 0.78810430625977823],
    [5, 0.907233493121721],
    [11, 0.97483428938325867],
    [20, 0.99519865308797284],
  ])("at %d is strucchange's value for equal sides", (x, expected) => {
    expect(argmaxCdf(x, 1, 1)).toBeCloseTo(expected, 10);
    expect(argmaxCdf(-x, 1, 1)).toBeCloseTo(1 - expected, 10);
  });

  it("has the quantiles of Bai (1997)", () => {
    expect(argmaxQuantile(0.95, 1, 1)).toBeCloseTo(7.6872755462913309, 6);
    expect(argmaxQuantile(0.975, 1, 1)).toBeCloseTo(11.033292445409387, 6);
  });

  it("does not overflow far out when the sides differ", () => {
    for (const x of [-4000, -300, 300, 4000]) {
      const value = argmaxCdf(x, 3, 0.2);
      expect(value).toBeGreaterThanOrEqual(-1e-12);
      expect(value).toBeLessThanOrEqual(1 + 1e-12);
    }
  });
});

describe("cumulativeNormal", () => {
  it("agrees with R's pnorm far into the tail", async () => {
    const points = [-37, -20, -8, -3, -2.83, -2.82, -1, 0, 0.5, 3, 9];
    const expected = await r.evaluate(`pnorm(c(${points.join(",")}))`);
    points.forEach((x, i) => {
      expect(cumulativeNormal(x) / expected[i]).toBeCloseTo(1, 10);
    });
  });
});
