import { describe, expect, it } from "vitest";
import { rememberForecasts, scoreForecasts, trackRecord } from "../../lib/job/trackRecord.ts";
import type { ForecastFacts } from "../../lib/words/facts.ts";

const forecast: ForecastFacts = {
  periods: ["2026-01-05", "2026-01-12"],
  point: [100, 110],
  median: [100, 110],
  intervals: [{ level: 80, low: [90, 95], high: [110, 125] }],
  total: { point: 210, intervals: [] },
  chances: [],
  candidates: [],
};

describe("the track record", () => {
  it("scores a forecast when its value has come, by step", () => {
    // Worked by hand: 104 is inside 90..110, error 4, naive error 6; 130 is outside 95..125, error 20, naive error 32.
    const made = rememberForecasts(undefined, forecast, [98, 98]);
    const first = scoreForecasts(made, (period) => (period === "2026-01-05" ? 104 : undefined));
    expect(trackRecord(first)).toMatchObject({
      forecasts: 1,
      insideRange: 1,
      meanAbsoluteError: 4,
      naiveMeanAbsoluteError: 6,
    });
    expect(first.pending).toHaveLength(1);
    const second = scoreForecasts(first, () => 130);
    expect(trackRecord(second)).toMatchObject({
      forecasts: 2,
      insideRange: 1,
      meanAbsoluteError: 12,
      naiveMeanAbsoluteError: 19,
      byHorizon: [
        { step: 1, forecasts: 1, insideRange: 1 },
        { step: 2, forecasts: 1, insideRange: 0, meanAbsoluteError: 20, naiveMeanAbsoluteError: 32 },
      ],
    });
  });

  it("drops a forecast whose period stayed a gap, unscored", () => {
    const state = scoreForecasts(rememberForecasts(undefined, forecast, [98, 98]), () => Number.NaN);
    expect(state.pending).toHaveLength(0);
    expect(trackRecord(state)).toBeNull();
  });

  it("starts anew when the level of the range was changed in settings", () => {
    const scored = scoreForecasts(rememberForecasts(undefined, forecast, [98, 98]), () => 104);
    const wider = { ...forecast, intervals: [{ ...forecast.intervals[0], level: 90 }] };
    expect(trackRecord(rememberForecasts(scored, wider, [98, 98]))).toBeNull();
  });
});
