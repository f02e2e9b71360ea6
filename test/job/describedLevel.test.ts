import { describe, expect, it } from "vitest";
import { forecastSeries } from "../../lib/forecast/forecastSeries.ts";
import { departures, describedLevel } from "../../lib/job/describedLevel.ts";

/** A line with a season of four and small alternating noise; the last two values missing on request. */
function quarters(trailingGaps: number): Float64Array {
  const season = [8, -3, -9, 4];
  let state = 7;
  const values = Float64Array.from({ length: 80 }, (_, t) => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return 100 + 2 * t + season[t % 4] + (state / 2 ** 32 - 0.5);
  });
  return values.fill(Number.NaN, values.length - trailingGaps);
}

describe("departures from the describing model's terms", () => {
  it.each([0, 2])("are its residuals before any autoregression, with %i gaps at the end", (gaps) => {
    const values = quarters(gaps);
    const { model } = forecastSeries(values, { horizon: 4, levels: [80], period: "quarter" });
    const left = departures(model, values).filter((value) => !Number.isNaN(value));
    expect(model.trend).toBe(true);
    // Trend and season gone, only the noise of at most one half to each side is left (with room for the estimates).
    expect(Math.max(...left.map(Math.abs))).toBeLessThan(model.scale === "log" ? 0.05 : 1.5);
  });

  it("return to the trend line one period past the last value", () => {
    const values = quarters(0);
    const { model } = forecastSeries(values, { horizon: 4, levels: [80], period: "quarter" });
    expect(Math.abs(describedLevel(model).value - (100 + 2 * 80))).toBeLessThan(2);
  });
});
