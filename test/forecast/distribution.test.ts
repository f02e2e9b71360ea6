import { describe, expect, it } from "vitest";
import type { AverageForecast } from "../../lib/forecast/averageForecast.ts";
import { calibrate, calibratedReach, normalOfReach } from "../../lib/forecast/calibration.ts";
import { limitChances } from "../../lib/forecast/limitChances.ts";
import type { MemberFit } from "../../lib/forecast/memberFit.ts";
import { normalProbability } from "../../lib/forecast/normal.ts";
import { normalDraws } from "../../lib/forecast/normalDraws.ts";
import { spreadQuantile, spreadScore } from "../../lib/forecast/predictiveSpread.ts";
import { totalQuantile } from "../../lib/forecast/totals.ts";
import { workingScales } from "../../lib/forecast/workingScale.ts";
import { withR } from "../support/r.ts";

const r = withR();
const HORIZON = 6;
const PREPARATION = { differences: [], season: 0, profile: "none", line: false, drifts: ["whole"] } as const;

/** An average that is one AR(1) with unit shocks, its ranges those of the normal distribution. */
function oneProcess(
  coefficient: number,
  differences: readonly number[],
  logarithm: boolean,
): AverageForecast {
  const scale = workingScales(logarithm ? [1, 2] : [-1, 2])[logarithm ? 1 : 0];
  const size = logarithm ? 0.01 : 1;
  const preparation = { ...PREPARATION, differences };
  const fit: MemberFit = {
    preparation,
    count: 1e9,
    stages: [],
    levelProfile: undefined,
    meanProfile: undefined,
    model: { coefficients: Float64Array.of(coefficient), innovationVariance: size ** 2, meanOrder: 1 },
    wholeMean: 0,
    localMean: 0,
    slope: 0,
  };
  const medians = new Float64Array(HORIZON).fill(20);
  const none = new Float64Array(HORIZON);
  let weight = 1;
  let response = 0;
  let power = 0;
  const deviations = Float64Array.from({ length: HORIZON }, () => {
    response = differences.length > 0 ? response + weight : weight;
    weight *= coefficient;
    power += response ** 2;
    return size * Math.sqrt(power);
  });
  return {
    candidates: [{ scale: 0, preparation, drift: "whole" }],
    scales: [{ scale, values: none }],
    fits: [fit],
    paths: medians,
    shares: Float64Array.of(1),
    spread: { medians, scales: [{ scale, share: 1, deviations }] },
    calibration: { narrow: 1, wide: 1, freedom: 1e9, shortness: 1 },
    backTest: {
      origins: 0,
      meanAbsoluteError: none,
      naiveMeanAbsoluteError: none,
      relativeError: Number.NaN,
      coverage80: Number.NaN,
    },
    naive: false,
    outliers: [],
    steps: [],
  };
}

describe("totalQuantile", () => {
  it("has the variance of the sum that R's ARMAtoMA weights give, errors of the steps correlated", async () => {
    for (const differences of [[], [1]]) {
      const weights = `c(1, ARMAtoMA(0.7, lag.max=${HORIZON - 1}))`;
      const response = differences.length > 0 ? `cumsum(${weights})` : weights;
      const [variance] = await r.evaluate(`sum(cumsum(${response})^2)`);
      const quantile = totalQuantile(oneProcess(0.7, differences, false), 0);
      expect(quantile(0)).toBe(HORIZON * 20);
      expect(quantile(1) - quantile(0)).toBeCloseTo(Math.sqrt(variance), 10);
    }
  });

  it("spans what simulated sums of a multiplicative process span", () => {
    const draw = normalDraws(4);
    const sums = Float64Array.from({ length: 20000 }, () => {
      let sum = 0;
      let level = 0;
      let step = 0;
      for (let h = 0; h < HORIZON; h++) {
        step = 0.5 * step + 0.01 * draw();
        level += step;
        sum += 20 * Math.exp(level);
      }
      return sum;
    }).sort();
    const quantile = totalQuantile(oneProcess(0.5, [1], true), 0);
    for (const z of [-1.2816, 1.2816]) {
      const simulated = sums[Math.round(normalProbability(z) * 19999)];
      // The simulated quantile itself is good to about 1.5 % of its distance from the middle.
      expect(Math.abs(quantile(z) - simulated)).toBeLessThan(0.05 * Math.abs(quantile(z) - quantile(0)));
    }
  });
});

describe("limitChances", () => {
  const average = oneProcess(0.7, [1], false);
  const { deviations } = average.spread.scales[0];

  it("gives for each period the normal chance of the distance to the limit", () => {
    const [{ each }] = limitChances(average, { above: 23 }, 1, 0);
    each.forEach((chance, h) => {
      expect(chance).toBeCloseTo(1 - normalProbability(3 / deviations[h]), 5);
    });
  });

  it("gives the chance that any does as counted on simulated paths of the process", () => {
    const draw = normalDraws(99);
    let passed = 0;
    for (let path = 0; path < 20000; path++) {
      let [step, level, hit] = [0, 0, false];
      for (let h = 0; h < HORIZON; h++) {
        step = 0.7 * step + draw();
        level += step;
        hit ||= level > 3;
      }
      if (hit) passed++;
    }
    const [{ any }] = limitChances(average, { above: 23 }, 1, 0);
    // 4,000 against 20,000 paths: three standard errors are 2.6 points.
    expect(Math.abs(any - passed / 20000)).toBeLessThan(0.026);
  });
});

describe("predictive spread", () => {
  it("finds the score of a value that its own quantile gave, on every mixture of scales", () => {
    const [raw, log] = workingScales([1, 2]);
    const spread = {
      medians: Float64Array.of(30),
      scales: [
        { scale: raw, share: 0.4, deviations: Float64Array.of(6) },
        { scale: log, share: 0.6, deviations: Float64Array.of(0.3) },
      ],
    };
    for (const z of [-6, -2, -0.5, 0, 0.7, 3, 9]) {
      expect(spreadScore(spread, 0, spreadQuantile(spread, 0, z))).toBeCloseTo(z, 6);
    }
  });
});

describe("calibration", () => {
  it("widens to the quantiles of past scores as evidence grows", () => {
    // Past scores spread like a normal of deviation 2: both factors must come to 2.
    const draw = normalDraws(8);
    const scores = Array.from({ length: 40000 }, () => Math.abs(2 * draw()));
    const evidence = { scores, weights: scores.map(() => 1) };
    const { narrow, wide } = calibrate(evidence, 1, 1e6, 1e9);
    expect(narrow).toBeCloseTo(2, 1);
    expect(wide).toBeCloseTo(2, 1);
    expect(calibrate({ scores: [], weights: [] }, 1.1, 0, 100).narrow).toBe(1.1);
  });

  it("turns a reach back into the normal quantile it came from", () => {
    const calibration = { narrow: 0.9, wide: 1.3, freedom: 10, shortness: 1.1 };
    for (const z of [-3, -1.5, -0.2, 0.6, 1.7, 2.6]) {
      expect(normalOfReach(calibration, calibratedReach(calibration, z))).toBeCloseTo(z, 9);
    }
  });
});
