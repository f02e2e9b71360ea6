import { describe, expect, it } from "vitest";
import { burgWorkspace } from "../../lib/autoregression/burg.ts";
import { smoothGaps } from "../../lib/autoregression/smoothGaps.ts";
import { afterChange } from "../../lib/forecast/afterChange.ts";
import { backTestOf } from "../../lib/forecast/backTest.ts";
import type { BankForecast } from "../../lib/forecast/candidateBank.ts";
import { candidateWeights, weightPower, weightsAhead } from "../../lib/forecast/candidateWeights.ts";
import { pastWeights } from "../../lib/forecast/combinedForecast.ts";
import { dampOutliers } from "../../lib/forecast/dampOutliers.ts";
import { fillGaps } from "../../lib/forecast/fillGaps.ts";
import { localDrift } from "../../lib/forecast/localDrift.ts";
import { fitMember } from "../../lib/forecast/memberFit.ts";
import { mixtureDeviation } from "../../lib/forecast/mixtureDeviation.ts";
import { naiveDoesBetter } from "../../lib/forecast/naiveFallback.ts";
import { naiveForecast } from "../../lib/forecast/naiveForecast.ts";
import { normalDraws } from "../../lib/forecast/normalDraws.ts";
import { horizonsCovered, rollingOrigins } from "../../lib/forecast/rollingOrigins.ts";
import { levelProfile } from "../../lib/forecast/seasonalProfile.ts";
import { memberShocks, shockTails } from "../../lib/forecast/shockTails.ts";
import { weightedMiddle } from "../../lib/forecast/weightedMiddle.ts";
import { workingScales } from "../../lib/forecast/workingScale.ts";
import { withR } from "../support/r.ts";

const r = withR();

/** A random walk with unit shocks. */
function walk(count: number, seed: number): Float64Array {
  const draw = normalDraws(seed);
  let level = 100;
  return Float64Array.from({ length: count }, () => {
    level += draw();
    return level;
  });
}

describe("weightedMiddle", () => {
  it("is R's quarter-trimmed mean when the weights are equal", async () => {
    const values = [3, -7, 12, 5.5, 0.25, 41, 8, 8.5];
    const [expected] = await r.evaluate(`mean(c(${values.join(",")}), trim=0.25)`);
    const got = weightedMiddle(Float64Array.from(values), new Float64Array(8).fill(2), new Int32Array(8));
    expect(got).toBeCloseTo(expected, 12);
  });

  it("counts each value for its weight between the quartiles, as worked by hand", () => {
    // Weights 1, 2, 1 of 4: the middle half is all of the second value.
    const shares = new Float64Array(3);
    const got = weightedMiddle(
      Float64Array.of(0, 5, 90),
      Float64Array.of(1, 2, 1),
      new Int32Array(3),
      shares,
    );
    expect(got).toBe(5);
    expect([...shares]).toEqual([0, 1, 0]);
  });
});

describe("levelProfile", () => {
  it("is the additive figure of R's decompose when the season is beyond doubt", async () => {
    const figure = [4, -3, 1, -2];
    const values = Float64Array.from({ length: 24 }, (_, t) => 10 + 0.3 * t + figure[t % 4]);
    await r.assign("v", values);
    const expected = await r.evaluate("decompose(ts(v, frequency=4))$figure");
    levelProfile(values, 4, 24).forEach((value, s) => {
      expect(value).toBeCloseTo(expected[s], 9);
    });
  });

  it("shrinks a season that is only noise to a small part of what it looks like", () => {
    const draw = normalDraws(11);
    const values = Float64Array.from({ length: 480 }, () => draw());
    const profile = levelProfile(values, 12, 480);
    // Season means of 40 values of unit noise have variance 1/40; shrinking must leave less than that.
    const power = profile.reduce((sum, value) => sum + value * value, 0) / 12;
    expect(power).toBeLessThan(1 / 40);
  });
});

describe("fillGaps", () => {
  it("goes on along a straight line through its gaps, and along a season of its own shape", () => {
    const line = Float64Array.from({ length: 30 }, (_, t) => 4 + 2 * t);
    for (const gap of [7, 8, 20]) line[gap] = Number.NaN;
    fillGaps(line, 0, burgWorkspace(30, 5)).forEach((value, t) => {
      expect(value).toBeCloseTo(4 + 2 * t, 9);
    });
    const season = Float64Array.from({ length: 48 }, (_, t) => [3, 9, 1, 7][t % 4] + t);
    season[21] = Number.NaN;
    expect(fillGaps(season, 4, burgWorkspace(48, 5))[21]).toBeCloseTo(9 + 21, 2);
  });

  it("stays within a few shocks of the truth wherever the gaps are, the first values included", () => {
    for (let seed = 1; seed <= 20; seed++) {
      const truth = walk(70, seed).map((value, t) => value + 5 * Math.sin((2 * Math.PI * t) / 12));
      const holed = truth.map((value, t) => ((t + seed) % 6 === 0 && t > 0 && t < 69 ? Number.NaN : value));
      const filled = fillGaps(holed, 12, burgWorkspace(70, 23));
      // A unit walk is known to √½ between neighbours; six times that leaves room for what was estimated.
      filled.forEach((value, t) => {
        expect(Math.abs(value - truth[t])).toBeLessThan(4.3);
      });
    }
  });

  it("comes within half a shock of what the core's smoother expects of a walk", () => {
    // The smoother of a stationary AR(1) close to one knows the same values; both expect the same in between.
    const values = walk(200, 5);
    for (const gap of [60, 61, 62, 130]) values[gap] = Number.NaN;
    const mean = values.filter((value) => !Number.isNaN(value)).reduce((sum, value) => sum + value, 0) / 196;
    const smooth = smoothGaps({ coefficients: [0.9999], mean, innovationVariance: 1 }, values).values;
    const filled = fillGaps(values, 0, burgWorkspace(200, 20));
    for (const gap of [60, 61, 62, 130]) expect(Math.abs(filled[gap] - smooth[gap])).toBeLessThan(0.5);
  });
});

describe("dampOutliers", () => {
  it("replaces a one-off, keeps a step, and halves a far last value", () => {
    const values = walk(120, 2);
    values[50] += 40;
    for (let t = 80; t < 120; t++) values[t] -= 30;
    values[119] += 60;
    const { outliers, steps, values: damped } = dampOutliers(values, 0, burgWorkspace(120, 20));
    expect(outliers).toEqual([50, 119]);
    expect(steps).toEqual([80]);
    expect(Math.abs(damped[50] - (values[49] + values[51]) / 2)).toBeLessThan(3);
    // One step stayed, one outlier went: (1 + 1)/(2 + 1 + 1) = half of the jump is believed.
    expect(damped[119] - damped[118]).toBeGreaterThan(25);
    expect(damped[119] - damped[118]).toBeLessThan(35);
  });

  it("leaves ordinary noise alone", () => {
    const values = walk(300, 3);
    expect(dampOutliers(values, 0, burgWorkspace(300, 20)).values).toBe(values);
  });
});

describe("candidateWeights", () => {
  it("is Student's likelihood of each origin's errors, worked by hand", () => {
    // The middle of 1 and 4 is 2.5; of it 0.15 is known before, 0.375: (1.375/4.375)^1.15 at two horizons.
    const losses = [[Float64Array.of(1, 4)]];
    const [best, other] = candidateWeights(losses, () => true, 2, weightPower(2));
    expect(best).toBe(1);
    expect(other).toBeCloseTo((1.375 / 4.375) ** 1.15, 12);
  });

  it("does not let one wild origin decide against three", () => {
    const losses = [[1, 1, 1, 90].map((first, o) => Float64Array.of(first, o < 3 ? 4 : 60))];
    const [steady, lucky] = candidateWeights(losses, () => true, 2, weightPower(4));
    expect(steady).toBeGreaterThan(lucky);
  });

  it("judges on every scale alike", () => {
    const mirrored = [[Float64Array.of(1, 5)], [Float64Array.of(0.05, 0.01)]];
    const [one, other] = candidateWeights(mirrored, () => true, 2, 2);
    expect(one).toBeCloseTo(other, 12);
  });

  it("weighs all alike without evidence", () => {
    expect([...candidateWeights([], (i) => i !== 1, 3, 0)]).toEqual([1, 0, 1]);
  });
});

describe("weightsAhead", () => {
  const variances = [Float64Array.of(1, 2, 3, 4), Float64Array.of(1, 4, 9, 36), Float64Array.of()];
  const at = (h: number, steps: number, power: number) => {
    const out = new Float64Array(3);
    weightsAhead(Float64Array.of(0.5, 0.5, 0), variances, h, { steps, power }, out);
    return [...out];
  };

  it("are the weights as far as was judged, and beyond fall with the growth of a candidate's own errors", () => {
    expect(at(1, 2, 0.5)).toEqual([0.5, 0.5, 0]);
    // From the second step to the fourth variances double and grow ninefold.
    const [steady, wandering, unfitted] = at(3, 2, 0.5);
    expect(steady).toBeCloseTo(0.5 / Math.SQRT2, 12);
    expect(wandering).toBeCloseTo(0.5 / 3, 12);
    expect(unfitted).toBe(0);
  });

  it("are the weights everywhere where nothing was judged", () => {
    expect(at(3, 0, 0)).toEqual([0.5, 0.5, 0]);
  });
});

describe("pastWeights", () => {
  it("judge an origin by the losses of those that share none of its outcomes, and by their number", () => {
    // Three origins of two steps, a step apart: only the first and the last share nothing.
    const origins = [8, 7, 6].map((count) => ({ count, steps: 2, fitted: 6 }));
    const fits = origins.map(() => undefined);
    const bank = { paths: new Float64Array(4), fits: [{}, {}], variances: fits } as unknown as BankForecast;
    const losses = [[Float64Array.of(1, 9), Float64Array.of(1e9, 1), Float64Array.of(4, 1)]];
    const rolled = { banks: [bank, bank, bank], losses, judged: { steps: 2, power: 2 } };
    // One horizon of evidence is left, of losses 1 and 9: the power is a half, 0.15·5 was known before.
    const { weights, judged } = pastWeights(rolled, origins, 2);
    const [best, other] = weights;
    expect(judged).toEqual({ steps: 2, power: 0.5 });
    expect(best).toBe(1);
    expect(other).toBeCloseTo((1.75 / 9.75) ** 0.575, 12);
    expect([...pastWeights(rolled, origins, 1).weights]).toEqual([1, 1]);
  });
});

describe("naiveDoesBetter", () => {
  const record = (model: readonly number[]) => {
    // Horizons of one step; the naive forecast misses by 1 each time, the model by as much as is given.
    const values = Float64Array.from({ length: 40 }, (_, t) => t);
    const origins = model.map((_, o) => ({ count: 39 - o, steps: 1, fitted: 20 }));
    const past = model.map((miss, o) => ({
      spread: {
        medians: Float64Array.of(39 - o + miss),
        scales: [{ scale: workingScales([-1])[0], share: 1, deviations: Float64Array.of(1) }],
      },
      shares: Float64Array.of(1),
    }));
    return backTestOf(values, past, origins, 0, 1, { narrow: 1, wide: 1, freedom: 100 });
  };

  it("only past the chance of the difference, which is larger where it comes in a burst", () => {
    // Misses of 1.5 and 0.9 in turn: 20 % worse on the mean, standard error 0.3/√9 = 0.1.
    const even = record([1.5, 0.9, 1.5, 0.9, 1.5, 0.9, 1.5, 0.9, 1.5, 0.9]);
    expect(even.naiveLead).toBeCloseTo(2, 10);
    expect(even.backTest.relativeError).toBeCloseTo(1.2, 10);
    // The same mean, all of it from one origin.
    const burst = record([3, 1, 1, 1, 1, 1, 1, 1, 1, 1]);
    expect(burst.backTest.relativeError).toBeCloseTo(1.2, 10);
    expect(burst.naiveLead).toBeLessThan(1.1);
    expect(naiveDoesBetter(1.2, even.naiveLead + 1e-9)).toBe(true);
    expect(naiveDoesBetter(1.2, 0.5)).toBe(false);
    expect(record([2, 2, 2]).naiveLead).toBe(Number.POSITIVE_INFINITY);
    expect(record([2]).naiveLead).toBe(0);
  });
});

describe("mixtureDeviation", () => {
  const order = new Int32Array(2);
  const equal = Float64Array.of(1, 1);

  it("adds the mean square distance to the middle variance, a far one cut at three deviations", () => {
    const quarters = Float64Array.of(0.25, 0.25);
    expect(mixtureDeviation(quarters, Float64Array.of(1, 3), equal, order)).toBeCloseTo(3, 12);
    // (4 + (0 + 36)/2): distances of 1e6 and of no number count as 3·2.
    for (const far of [1e6, Number.NaN]) {
      const deviation = mixtureDeviation(quarters, Float64Array.of(0, far), equal, order);
      expect(deviation).toBeCloseTo(Math.sqrt(22), 12);
    }
  });

  it("is that of the product of the densities' roots where candidates agree, worked by hand", () => {
    // √(exp(−x²/2)·exp(−x²/8)) = exp(−x²·(1/2 + 1/8)/2): a variance of 1/(0.5 + 0.125) = 1.6.
    const deviation = mixtureDeviation(Float64Array.of(1, 0.25), new Float64Array(2), equal, order);
    expect(deviation).toBeCloseTo(Math.sqrt(1.6), 12);
  });
});

describe("shockTails", () => {
  it("are those of the normal law for its own draws, and narrow where a few shocks make the mean square", () => {
    const draw = normalDraws(31);
    const normal = shockTails(Float64Array.from({ length: 20000 }, () => draw()));
    expect(normal.narrow).toBeGreaterThan(0.98);
    expect(normal.wide).toBeGreaterThan(0.98);
    // One in a hundred of size 20 beside unit ones: mean square 0.99 + 0.01·400 = 4.99.
    const mixed = shockTails(Float64Array.from({ length: 20000 }, (_, t) => (t % 100 === 0 ? 20 : draw())));
    expect(mixed.narrow).toBeGreaterThan(0.42);
    expect(mixed.narrow).toBeLessThan(0.48);
    expect(mixed.wide).toBeGreaterThanOrEqual(mixed.narrow);
    expect(shockTails(Float64Array.of(1, -1, 2))).toEqual({ narrow: 1, wide: 1 });
  });

  it("come from the one-step errors of a member on its own values", () => {
    const values = Float64Array.of(5, 7, 6, 9, 8, 12, 11, 13);
    const fit = fitMember(
      values,
      8,
      { differences: [1], season: 0, profile: "none", line: false, drifts: ["whole"] },
      1,
      burgWorkspace(8, 1),
    );
    if (fit === undefined) throw new Error("no fit");
    const [phi] = fit.model.coefficients;
    const steps = [2, -1, 3, -1, 4, -1, 2].map((step) => step - 8 / 7);
    [...memberShocks(fit)].forEach((shock, t) => {
      expect(shock).toBeCloseTo(steps[t + 1] - phi * steps[t], 12);
    });
    expect(memberShocks(fit)).toHaveLength(6);
  });
});

describe("rollingOrigins", () => {
  it("leaves enough to fit and shares no fit with an origin that lies before it", () => {
    for (const [count, horizon] of [
      [9, 6],
      [40, 8],
      [260, 13],
      [2000, 48],
    ]) {
      const origins = rollingOrigins(count, horizon, 8);
      for (const { count: at, steps, fitted } of origins) {
        expect(fitted).toBeGreaterThanOrEqual(8);
        expect(fitted).toBeLessThanOrEqual(at);
        expect(at + steps).toBeLessThanOrEqual(count);
      }
      expect(new Set(origins.map(({ fitted }) => fitted)).size).toBeLessThanOrEqual(8);
    }
    expect(rollingOrigins(8, 4, 8)).toEqual([]);
  });

  it("stand half a horizon apart where there is room", () => {
    const [newest, next] = rollingOrigins(400, 12, 8);
    expect([newest.count, next.count]).toEqual([388, 382]);
  });

  it("cover each outcome once, in horizons", () => {
    const at = (count: number, steps: number) => ({ count, steps, fitted: count });
    expect(horizonsCovered([at(18, 2), at(16, 4), at(14, 4), at(4, 4)])).toBe((6 + 4) / 4);
    expect(horizonsCovered([])).toBe(0);
  });
});

describe("naiveForecast, localDrift and afterChange", () => {
  it("repeat the last season, and across a gap the season before it", () => {
    expect([...naiveForecast([1, 2, 3, 4, Number.NaN, 6], 6, 3, 4)]).toEqual([4, 2, 6, 4]);
    expect([...naiveForecast([1, 2, Number.NaN], 3, 0, 2)]).toEqual([2, 2]);
  });

  it("take the drift of the last stretch when the old one is over", () => {
    const steps = Float64Array.from({ length: 60 }, (_, t) => (t < 40 ? 0 : 3) + ((t * 7) % 3) * 0.01);
    expect(localDrift(steps)).toBeGreaterThan(2.5);
    expect(localDrift(Float64Array.from({ length: 60 }, (_, t) => (t % 2 ? 1 : -1)))).toBeCloseTo(0, 1);
  });

  it("keep only what came after the change, or move the past to the new level", () => {
    const values = Float64Array.from([1, 1, 1, 1, 5, 5]);
    expect([...afterChange(values, 4, 2, 0)]).toEqual([5, 5]);
    expect([...afterChange(values, 4, 10, 0)]).toEqual([5, 5, 5, 5, 5, 5]);
    expect(afterChange(values, undefined, 2, 0)).toBe(values);
  });

  it("tell a step from the season and from growth", () => {
    const path = (t: number) => [10, 40, 20, 0][t % 4] + 2 * t;
    for (const since of [1, 2, 3, 7]) {
      const values = Float64Array.from({ length: 11 + since }, (_, t) => path(t) + (t < 11 ? 0 : 50));
      values[9] = Number.NaN;
      const moved = afterChange(values, 11, 20, 4);
      moved.forEach((value, t) => {
        if (t !== 9) expect(value).toBe(path(t) + 50);
      });
    }
    // One season before the change shows no growth, and a shorter past no season either.
    expect([...afterChange(Float64Array.of(10, 40, 20, 0, 15), 4, 9, 4)]).toEqual([15, 45, 25, 5, 15]);
    expect([...afterChange(Float64Array.of(10, 40, 20, 5), 3, 9, 4)]).toEqual([-5, 25, 5, 5]);
  });

  it("find a step of 40 in weekly random walks, which have no season", () => {
    const draw = normalDraws(5);
    let wrong = 0;
    for (let series = 0; series < 100; series++) {
      let level = 0;
      const values = Float64Array.from({ length: 163 + (series % 8) }, (_, t) => {
        level += draw();
        return level + (t < 160 ? 0 : 40);
      });
      wrong += Math.abs(afterChange(values, 160, 208, 52)[0] - values[0] - 40) / 100;
    }
    // The walk moves by √10·√(2/π) = 2.5 on average in the most values since, ten, and by 5.8 in a year.
    expect(wrong).toBeLessThan(2.5);
  });

  it("find a step of 40 in white noise of deviation 5 about a season six times that", () => {
    const draw = normalDraws(3);
    let wrong = 0;
    for (let series = 0; series < 200; series++) {
      const changed = 60 + (series % 12);
      const values = Float64Array.from(
        { length: changed + 3 + (series % 8) },
        (_, t) => 100 + 30 * Math.sin((2 * Math.PI * t) / 12) + 5 * draw() + (t < changed ? 0 : 40),
      );
      wrong += Math.abs(afterChange(values, changed, 48, 12)[0] - values[0] - 40) / 200;
    }
    // One value less the one a season before would err by 5·√2·√(2/π) = 5.6 on average; there are three or more.
    expect(wrong).toBeLessThan(5.6);
  });
});
