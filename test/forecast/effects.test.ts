import { describe, expect, it } from "vitest";
import { forecastSeries } from "../../lib/forecast/forecastSeries.ts";
import { normalDraws } from "../../lib/forecast/normalDraws.ts";

const HORIZON = 6;
const options = { horizon: HORIZON, levels: [80, 95], seed: 5 } as const;

/** Noise about 100 with a deviation of 5; in every tenth period an event takes off or adds `amount`. */
function fairs(count: number, amount: number) {
  const draw = normalDraws(8);
  const plain = Float64Array.from({ length: count }, () => 100 + 5 * draw());
  const effects = new Float64Array(count + HORIZON);
  for (let t = 0; t < count; t += 10) effects[t] = amount;
  return { plain, effects, values: plain.map((value, t) => value + effects[t]) };
}

describe("known effects of events", () => {
  it("come off the past and on all that is said of the coming periods", () => {
    const { plain, effects, values } = fairs(120, 40);
    effects.set([0, 30, 0, -12, 7, 0], 120);
    const without = forecastSeries(plain, options);
    const { point, median, intervals, total, model } = forecastSeries(values, { ...options, effects });
    const coming = effects.subarray(120);
    coming.forEach((added, h) => {
      expect(point[h]).toBeCloseTo(without.point[h] + added, 8);
      expect(median[h]).toBeCloseTo(without.median[h] + added, 8);
      intervals.forEach(({ low, high }, i) => {
        expect(low[h]).toBeCloseTo(without.intervals[i].low[h] + added, 8);
        expect(high[h]).toBeCloseTo(without.intervals[i].high[h] + added, 8);
      });
    });
    expect(total.point).toBeCloseTo(without.total.point + 25, 7);
    expect(total.intervals[1].high).toBeCloseTo(without.total.intervals[1].high + 25, 7);
    expect(model.fit.innovationVariance).toBeCloseTo(without.model.fit.innovationVariance, 8);
  });

  it("move the chance of a limit by as much, in each period and in any", () => {
    const { plain, effects, values } = fairs(120, 40);
    effects.fill(-20, 120);
    const [chance] = forecastSeries(values, { ...options, effects, limits: { above: 85 } }).chances;
    const [moved] = forecastSeries(plain, { ...options, limits: { above: 105 } }).chances;
    expect(chance.limit).toBe(85);
    chance.each.forEach((one, h) => {
      expect(one).toBeCloseTo(moved.each[h], 10);
    });
    expect(chance.any).toBe(moved.any);
    // Nearly all periods were above 85 without the event: that must not be left in the chance of any.
    expect(chance.any).toBeLessThan(0.9);
  });

  it("hold within bounds: what is closed sells nothing, not less", () => {
    const { effects, values } = fairs(120, 40);
    effects.fill(-300, 120);
    const { point, intervals, total } = forecastSeries(values, { ...options, effects, bounds: { low: 0 } });
    expect([...point, ...intervals[1].low, ...intervals[1].high, total.point]).toEqual(
      new Array(3 * HORIZON + 1).fill(0),
    );
  });

  it("do not make counts fractions: their ranges are whole, a limit is passed by the next whole number", () => {
    const draw = normalDraws(2);
    const counts = Float64Array.from({ length: 120 }, () => Math.max(0, Math.round(9 + 2 * draw())));
    const effects = new Float64Array(120 + HORIZON);
    effects[50] = 2.5;
    const limits = { above: 10 };
    const plain = forecastSeries(counts, { ...options, limits });
    const told = forecastSeries(counts, { ...options, limits, effects });
    for (const { low, high } of told.intervals) expect([...low, ...high].every(Number.isInteger)).toBe(true);
    // One value of 120 was moved by 2.5; a limit not half a count off would change the chance by a third.
    told.chances[0].each.forEach((one, h) => {
      expect(Math.abs(one / plain.chances[0].each[h] - 1)).toBeLessThan(0.1);
    });
  });

  it("must be told for every value and every step", () => {
    const { plain, effects } = fairs(60, 40);
    expect(() => forecastSeries(plain, { ...options, effects: effects.subarray(1) })).toThrow(
      "forecastSeries needs effects for 60 values and 6 coming ones, got 65",
    );
  });
});
