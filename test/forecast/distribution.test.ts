import { describe, expect, it } from "vitest";
import type { AverageForecast } from "../../lib/forecast/averageForecast.ts";
import {
  addOutcomes,
  calibrate,
  calibratedReach,
  expectedWidening,
  noEvidence,
  normalOfReach,
} from "../../lib/forecast/calibration.ts";
import { limitChances } from "../../lib/forecast/limitChances.ts";
import type { MemberFit } from "../../lib/forecast/memberFit.ts";
import { normalProbability } from "../../lib/forecast/normal.ts";
import { normalDraws } from "../../lib/forecast/normalDraws.ts";
import { type PredictiveSpread, spreadQuantile, spreadScore } from "../../lib/forecast/predictiveSpread.ts";
import { NORMAL_TAILS } from "../../lib/forecast/shockTails.ts";
import { totalQuantile } from "../../lib/forecast/totals.ts";
import { workingScales } from "../../lib/forecast/workingScale.ts";
import { withR } from "../support/r.ts";

const r = withR();
const HORIZON = 6;
const PREPARATION = { differences: [], season: 0, profile: "none", line: false, drifts: ["whole"] } as const;

/**
 * An average that is one AR(1) with unit shocks, its ranges those of the normal distribution; its mean is known, or
 * estimated from `count` values.
 */
function oneProcess(
  coefficient: number,
  differences: readonly number[],
  logarithm: boolean,
  count?: number,
): AverageForecast {
  const scale = workingScales(logarithm ? [1, 2] : [-1, 2])[logarithm ? 1 : 0];
  const size = logarithm ? 0.01 : 1;
  const preparation = { ...PREPARATION, differences };
  const fit: MemberFit = {
    preparation,
    count: count ?? 1e9,
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
    candidates: [{ scale: 0, preparation, drift: count === undefined ? "none" : "whole" }],
    scales: [{ scale, values: none }],
    fits: [fit],
    paths: medians,
    weights: Float64Array.of(1),
    shares: Float64Array.of(1),
    spread: { medians, scales: [{ scale, share: 1, deviations }] },
    calibration: { narrow: 1, wide: 1, freedom: 1e9 },
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

  it("counts that the mean of all steps is estimated, as worked by hand", () => {
    // White noise about the mean of 50: six shocks, and six times an error of variance 1/50.
    const quantile = totalQuantile(oneProcess(0, [], false, 50), 0);
    expect(quantile(1) - quantile(0)).toBeCloseTo(Math.sqrt(6 + 36 / 50), 10);
  });

  it("is the step's own when one step is left", () => {
    const average = oneProcess(0.7, [1], true);
    const quantile = totalQuantile(average, HORIZON - 1);
    for (const z of [-2, 0, 1.3]) expect(quantile(z)).toBe(spreadQuantile(average.spread, HORIZON - 1, z));
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
    const [{ each }] = limitChances(average, { above: 23 }, new Float64Array(HORIZON), 1, 0);
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
    const [{ any }] = limitChances(average, { above: 23 }, new Float64Array(HORIZON), 1, 0);
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
  /** A spread of unit deviation about zero, so that an outcome is its own score. */
  const unit = (steps: number): PredictiveSpread => ({
    medians: new Float64Array(steps),
    scales: [{ scale: workingScales([-1])[0], share: 1, deviations: new Float64Array(steps).fill(1) }],
  });
  const evidenceOf = (origins: readonly (readonly number[])[], ages = origins.map(() => 0)) => {
    const evidence = noEvidence();
    origins.forEach((outcomes, o) => {
      addOutcomes(evidence, unit(outcomes.length), outcomes, 0, ages[o]);
    });
    return evidence;
  };

  it("comes to the quantiles of past scores as evidence grows, and is what the model says without any", () => {
    const draw = normalDraws(8);
    const origins = Array.from({ length: 400 }, () => Array.from({ length: 100 }, () => 1.5 * draw()));
    const { narrow, wide } = calibrate(evidenceOf(origins), 1, NORMAL_TAILS, 400, 1e9);
    expect(narrow).toBeCloseTo(1.5, 1);
    expect(wide).toBeCloseTo(1.5, 1);
    const nothing = calibrate(noEvidence(), 1.1, { narrow: 0.5, wide: 0.9 }, 0, 1e12);
    expect(nothing.narrow).toBeCloseTo(0.55, 9);
    expect(nothing.wide).toBeCloseTo(0.99, 9);
  });

  it("lies between past and expectation as a weighted mean of logarithms", () => {
    // One horizon: between = 0.25·2/2, worth 0.25/0.06 horizons of expectation; every past score is 3.
    const share = 1 / (1 + 0.25 / 0.06);
    const { narrow } = calibrate(evidenceOf([[3, -3, 3]]), 1, NORMAL_TAILS, 1, 100);
    expect(Math.log(narrow)).toBeCloseTo(share * Math.log(3 / 1.2815515655446004), 10);
  });

  it("believes the tails of many shocks, and little of those of a few", () => {
    const tails = { narrow: 0.5, wide: 0.8 };
    const narrowOf = (count: number): number => calibrate(noEvidence(), 1, tails, 0, count).narrow;
    expect(narrowOf(2000)).toBeLessThan(0.53);
    expect(narrowOf(20)).toBeGreaterThan(0.8);
  });

  it("expects ranges to widen with the terms estimated, by Akaike's final prediction error", () => {
    // (n + k)/(n − k): 1.5 for 8 terms of 40 values beside none (Akaike 1970, Statistical predictor identification).
    expect(expectedWidening(40, 8) / expectedWidening(40, 0)).toBeCloseTo(1.5, 12);
    expect(expectedWidening(40, 0)).toBeCloseTo(0.8, 12);
  });

  it("believes an even past more than one of bursts with the same quantiles", () => {
    const even = [0, 1, 2, 3].map(() => [4, 4, 0.5, 0.5]);
    const bursts = [
      [4, 4, 4, 4],
      [4, 4, 4, 4],
      [0.5, 0.5, 0.5, 0.5],
      [0.5, 0.5, 0.5, 0.5],
    ];
    const factor = (origins: readonly (readonly number[])[]) =>
      calibrate(evidenceOf(origins), 1, NORMAL_TAILS, 4, 100).narrow;
    expect(factor(even)).toBeGreaterThan(1.2 * factor(bursts));
    expect(factor(bursts)).toBeGreaterThan(1);
  });

  it("goes by recent horizons more than by old ones", () => {
    const origins = Array.from({ length: 8 }, (_, o) => Array(4).fill(o < 4 ? 0.5 : 3));
    const ages = origins.map((_, o) => o);
    const calm = calibrate(evidenceOf(origins, ages), 1, NORMAL_TAILS, 8, 100).narrow;
    const wild = calibrate(evidenceOf([...origins].reverse(), ages), 1, NORMAL_TAILS, 8, 100).narrow;
    expect(calm).toBeLessThan(0.8);
    expect(wild).toBeGreaterThan(1.2);
  });

  it("turns a reach back into the normal quantile it came from", () => {
    const calibration = { narrow: 0.9, wide: 1.3, freedom: 10 };
    for (const z of [-3, -1.5, -0.2, 0.6, 1.7, 2.6]) {
      expect(normalOfReach(calibration, calibratedReach(calibration, z))).toBeCloseTo(z, 9);
    }
  });
});
