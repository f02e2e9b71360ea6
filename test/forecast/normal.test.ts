import { describe, expect, it } from "vitest";
import { normalProbability, normalQuantile } from "../../lib/forecast/normal.ts";
import { spreadMean } from "../../lib/forecast/spreadMean.ts";
import { studentFromNormal } from "../../lib/forecast/student.ts";
import { workingScales } from "../../lib/forecast/workingScale.ts";
import { withR } from "../support/r.ts";

const r = withR();

describe("normal and Student quantiles", () => {
  it("agree with R's qnorm from deep tail to deep tail", async () => {
    const probabilities = [1e-300, 1e-20, 1e-6, 0.001, 0.025, 0.075, 0.1, 0.4, 0.5, 0.8, 0.975, 0.999999];
    const expected = await r.evaluate(`qnorm(c(${probabilities.join(",")}))`);
    probabilities.forEach((probability, i) => {
      expect(Math.abs(normalQuantile(probability) - expected[i])).toBeLessThan(
        1e-14 * (1 + Math.abs(expected[i])),
      );
    });
  });

  it("agree with R's pnorm on both sides of the change of method", async () => {
    const points = [-38, -8, -2.51, -2.49, -1, 0, 0.3, 2.49, 2.51, 6];
    const expected = await r.evaluate(`pnorm(c(${points.join(",")}))`);
    points.forEach((z, i) => {
      expect(Math.abs(normalProbability(z) - expected[i])).toBeLessThan(1e-15 + 1e-12 * expected[i]);
    });
  });

  it("turn into R's qt within 0.3 % up to the 95 % range, and from 8 degrees of freedom within 0.5 % at 99.9 %", async () => {
    const apart = async (freedom: number, level: number) => {
      const [expected] = await r.evaluate(`qt(${0.5 + level / 200}, ${freedom})`);
      return Math.abs(studentFromNormal(normalQuantile(0.5 + level / 200), freedom) / expected - 1);
    };
    for (const freedom of [4, 6, 15, 65, 300]) {
      for (const level of [50, 80, 95]) expect(await apart(freedom, level)).toBeLessThan(3e-3);
    }
    for (const freedom of [8, 15, 65, 300]) expect(await apart(freedom, 99.9)).toBeLessThan(5e-3);
  });
});

describe("spreadMean", () => {
  it("is the lognormal mean exp(m + s²/2) on the logarithm while shocks stay below a doubling", () => {
    const [, log] = workingScales([1, 2]);
    const spread = {
      medians: Float64Array.of(50),
      scales: [{ scale: log, share: 1, deviations: Float64Array.of(0.12) }],
    };
    // E exp(N(log 50, 0.12²)); the tail past a doubling lies 5.8 deviations out.
    expect(spreadMean(spread, 0, 1)).toBeCloseTo(50 * Math.exp(0.12 ** 2 / 2), 4);
  });

  it("is the mean in closed form where a quantile bends: at a doubling and at zero", () => {
    const [, log] = workingScales([1, 2]);
    const [, root] = workingScales([0, 2]);
    const density = (z: number) => Math.exp(-(z * z) / 2) / Math.sqrt(2 * Math.PI);
    const meanOf = (scale: typeof log, median: number, deviation: number) =>
      spreadMean(
        {
          medians: Float64Array.of(median),
          scales: [{ scale, share: 1, deviations: Float64Array.of(deviation) }],
        },
        0,
        1,
      );
    // The trapezoid rule errs by h³·√3/216·φ(z) times the jump of the second derivative: below 1e-5 in each case.
    for (const s of [0.5, 0.8]) {
      const bend = Math.LN2 / s;
      const below = Math.exp((s * s) / 2) * normalProbability(bend - s);
      const above = 2 * ((1 - Math.LN2) * normalProbability(-bend) + s * density(bend));
      expect(Math.abs(meanOf(log, 7, s) / (7 * (below + above)) - 1)).toBeLessThan(1e-5);
    }
    // E max(0, 1 + z)² = 2Φ(1) + φ(1) = 1.92466.
    expect(Math.abs(meanOf(root, 1, 1) - 2 * normalProbability(1) - density(1))).toBeLessThan(1e-5);
  });

  it("is the median on the raw scale", () => {
    const [raw] = workingScales([-1, 2]);
    const spread = {
      medians: Float64Array.of(-3),
      scales: [{ scale: raw, share: 1, deviations: Float64Array.of(2) }],
    };
    expect(spreadMean(spread, 0, 1.3)).toBeCloseTo(-3, 12);
  });
});
