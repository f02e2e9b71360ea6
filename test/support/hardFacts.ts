import { periodStart } from "../../lib/series/periods.ts";
import type { RunFacts, SeriesFacts } from "../../lib/words/facts.ts";
import { branchFacts, loansRun, mondays, quay } from "./factsFixture.ts";
import { quayChange, stationSurprise } from "./findingsFixture.ts";

// What is hard to draw: long and hostile names, huge and tiny numbers, gaps, hours, many marks, many lags, no data.

const base = (series: string, seed: number) =>
  branchFacts({ series, level: 100, coefficient: 0.6, shockSize: 12, seed });

const scaled = (facts: SeriesFacts, factor: number): SeriesFacts => {
  const times = (values: readonly number[]) => values.map((value) => value * factor);
  return {
    ...facts,
    history: {
      ...facts.history,
      values: facts.history.values.map((value) => (value === null ? null : value * factor)),
    },
    forecast: {
      ...facts.forecast,
      point: times(facts.forecast.point),
      intervals: facts.forecast.intervals.map((one) => ({
        ...one,
        low: times(one.low),
        high: times(one.high),
      })),
      total: {
        point: facts.forecast.total.point * factor,
        intervals: facts.forecast.total.intervals.map((one) => ({
          ...one,
          low: one.low * factor,
          high: one.high * factor,
        })),
      },
    },
  };
};

const hourly: SeriesFacts = {
  ...base("Boiler house, third floor, north wing, meter 7", 4),
  unit: "kWh",
  period: "hour",
  history: { start: "2026-12-02T23:00:00Z", values: base("x", 4).history.values },
  lastPeriod: "2026-12-07T06:00:00Z",
  forecast: {
    ...base("x", 4).forecast,
    periods: Array.from({ length: 8 }, (_, step) => periodStart("2026-12-07T07:00:00Z", "hour", step)),
  },
  attribution: null,
  comparison: null,
  monitor: null,
  trackRecord: null,
};

const manyMarks: SeriesFacts = {
  ...base("Park", 2),
  findings: [
    ...mondays("2026-09-07", 6).map((period) => ({
      ...quayChange,
      change: { period, low: period, high: period },
    })),
    stationSurprise,
    { ...stationSurprise, period: "2026-11-23" },
  ],
};

const lags = 30;
const manyLags: SeriesFacts = {
  ...base("Mill", 1),
  model: {
    ...base("Mill", 1).model,
    order: lags,
    coefficients: Array.from({ length: lags }, (_, lag) => ((lag % 5) - 2) / 10),
    standardErrors: Array.from({ length: lags }, () => 0.08),
    halfLife: null,
    halfLifeRange: { low: 4, high: null },
    rhythm: { length: 7.2, damping: 0.93 },
    fading: "permanent",
  },
};

const bare: SeriesFacts = {
  ...base("<img src=x onerror=alert(1)>\u202E", 3),
  unit: '"><script>alert(1)</script>',
  history: { start: "2026-11-23", values: [null, 3] },
  observed: 1,
  gaps: 1,
  model: {
    ...base("x", 3).model,
    order: 0,
    coefficients: [],
    standardErrors: [],
    weights: [1],
    residualAutocorrelations: [],
    ljungBox: null,
  },
  comparison: null,
  attribution: null,
  monitor: null,
  trackRecord: null,
  findings: [{ code: "forecast-note", note: { code: "too-short", observed: 1 } }],
};

const gapped: SeriesFacts = {
  ...base("Station", 5),
  history: {
    ...base("Station", 5).history,
    values: base("Station", 5).history.values.map((value, index) => (index % 3 === 1 ? null : value)),
  },
  findings: [{ code: "stale", lastPeriod: "2026-11-09", periodsLate: 4 }],
};

export const hardRun: RunFacts = {
  ...loansRun,
  tables: [
    {
      table: "north/loans",
      series: [
        scaled({ ...quay, series: "Billions" }, 3.3e7),
        scaled({ ...quay, series: "Tiny" }, 2e-5),
        manyMarks,
        manyLags,
      ],
      problems: [],
    },
    {
      table: "a-table-with-a-very-long-name-that-somebody-exported-from-somewhere/2026-final-final",
      series: [hourly, bare, gapped],
      problems: Array.from({ length: 60 }, (_, line) => ({
        table: "x",
        line: line + 2,
        column: "<b>date</b>",
        code: "bad-date",
        message: `"3${line}/02/2026" is no date.`,
        remedy: "Correct the day & month.",
        fatal: false,
      })),
    },
  ],
  failed: [
    {
      table: "members",
      problems: [
        {
          table: "members",
          code: "no-header",
          message: "The file has no header line.",
          remedy: "Add one.",
          fatal: true,
        },
      ],
    },
  ],
  left: ["one", "two", "three", "four", "five"],
};
