import { describe, expect, it } from "vitest";
import { accuracy } from "../../lib/forecast/accuracy.ts";
import { withR } from "../support/r.ts";

const r = withR();
const TRAINING = [112, 118, 132, 129, 121, 135, 148, 148, 136, 119, 104, 118, 115, 126];
const ACTUAL = [141, 135, 125, 149];
const FORECAST = [130, 138, 120, 170.5];

describe("accuracy", () => {
  it("scales the absolute error by the in-sample difference at the season, as worked by hand", () => {
    // In-sample |x_t − x_{t−1}| of 1, 2, 4 is 1 and 2, mean 1.5; errors 3 and 0, mean 1.5.
    const hand = accuracy.meanAbsoluteScaledError([7, 4], [4, 4], { training: [1, 2, 4] });
    expect(hand).toBeCloseTo(1, 14);
  });

  it("agrees with R on the scaled and the percentage error, plain and seasonal", async () => {
    await r.assign("x", TRAINING);
    await r.assign("y", ACTUAL);
    await r.assign("f", FORECAST);
    const [plain, seasonal, percentage] = await r.evaluate(
      "c(mean(abs(y-f))/mean(abs(diff(x))), mean(abs(y-f))/mean(abs(diff(x, lag=4))), mean(200*abs(y-f)/(abs(y)+abs(f))))",
    );
    const at = (season: number) =>
      accuracy.meanAbsoluteScaledError(ACTUAL, FORECAST, { training: TRAINING, season });
    expect(at(1)).toBeCloseTo(plain, 12);
    expect(at(4)).toBeCloseTo(seasonal, 12);
    expect(accuracy.symmetricMeanAbsolutePercentageError(ACTUAL, FORECAST)).toBeCloseTo(percentage, 12);
  });

  it("punishes an outcome outside the range by 2/alpha times its distance", () => {
    // Width 4 each; the second outcome lies 1 above: (4 + 4 + 2/0.2 · 1)/2 = 9, over a scale of 2.
    const score = accuracy.meanScaledIntervalScore(
      [1, 6],
      { level: 80, low: [0, 1], high: [4, 5] },
      { training: [0, 2, 0] },
    );
    expect(score).toBeCloseTo(4.5, 14);
  });

  it("gives the continuous ranked probability score that R integrates from its definition", async () => {
    for (const [actual, mean, standardDeviation] of [
      [0, 0, 1],
      [1.5, 0, 1],
      [10, 9.5, 3],
      [0, 8, 1],
    ]) {
      const [integral] = await r.evaluate(
        `integrate(function(x) pnorm(x, ${mean}, ${standardDeviation})^2, -Inf, ${actual}, rel.tol=1e-10)$value +
         integrate(function(x) (1-pnorm(x, ${mean}, ${standardDeviation}))^2, ${actual}, Inf, rel.tol=1e-10)$value`,
      );
      expect(accuracy.continuousRankedProbabilityScore(actual, { mean, standardDeviation })).toBeCloseTo(
        integral,
        7,
      );
    }
  });

  it("scores a sample by its empirical distribution, as the double sum in R", async () => {
    const sample = [1, 4, 2.5, 9, -3];
    await r.assign("s", sample);
    const [expected] = await r.evaluate("mean(abs(s-2.2)) - mean(abs(outer(s,s,'-')))/2");
    expect(accuracy.continuousRankedProbabilityScore(2.2, { sample })).toBeCloseTo(expected, 12);
  });

  it("leaves gaps out of the actual values and refuses lengths that differ", () => {
    const scaling = { training: [1, 2, 4] };
    expect(accuracy.meanAbsoluteScaledError([Number.NaN, 4], [99, 1], scaling)).toBeCloseTo(2, 14);
    expect(() => accuracy.symmetricMeanAbsolutePercentageError([1], [1, 2])).toThrow(/2 for 1/);
    expect(() => accuracy.meanAbsoluteScaledError([1], [1], { training: [1], season: 2 })).toThrow(
      /training/,
    );
  });
});
