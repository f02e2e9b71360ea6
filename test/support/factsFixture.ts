import type { Finding, RunFacts, SeriesFacts, Voice } from "../../lib/words/facts.ts";
import { quayChange, stationSurprise } from "./findingsFixture.ts";

// A library of tools lends things from four branches, counted by week. The numbers are made up and plausible;
// they come from no model of ours, so that words and pictures are judged on facts they did not make.

export const britishVoice: Voice = {
  locale: "en-GB",
  timeZone: "Europe/Lisbon",
  quietWhenSteady: false,
  reportBase: null,
};

/** Weeks of 2026 from the first Monday: index 47 is the week of 30 November. */
export function mondays(from: string, count: number): string[] {
  return Array.from({ length: count }, (_, week) =>
    new Date(Date.parse(from) + week * 7 * 86_400_000).toISOString().slice(0, 10),
  );
}

/** A fixed sequence of shocks without trend, between −2 and 2. */
const shock = (index: number) => ((index * 7919 + 104_729) % 4001) / 1000 - 2;

interface Branch {
  readonly series: string;
  readonly level: number;
  readonly coefficient: number;
  readonly shockSize: number;
  readonly seed: number;
  readonly findings?: readonly Finding[];
  readonly lastShock?: number;
  readonly limit?: number;
}

/** The facts of one weekly branch whose loans follow x_t − level = φ (x_{t−1} − level) + e_t. */
export function branchFacts(branch: Branch): SeriesFacts {
  const { level, coefficient, shockSize, seed, lastShock } = branch;
  const weeks = 104;
  const start = mondays("2024-12-09", 1)[0];
  const shocks = Array.from({ length: weeks }, (_, week) => shockSize * shock(week * 13 + seed * 101));
  if (lastShock !== undefined) shocks[weeks - 1] = lastShock;
  let deviation = 0;
  const deviations = shocks.map((one) => (deviation = coefficient * deviation + one));
  const horizon = 8;
  const periods = mondays("2026-12-07", horizon);
  const point = periods.map((_, step) => level + deviation * coefficient ** (step + 1));
  const deviationAt = (step: number) =>
    shockSize * Math.sqrt((1 - coefficient ** (2 * (step + 1))) / (1 - coefficient ** 2));
  const interval = (percent: number, quantile: number) => ({
    level: percent,
    low: point.map((value, step) => value - quantile * deviationAt(step)),
    high: point.map((value, step) => value + quantile * deviationAt(step)),
  });
  const total = point.reduce((sum, value) => sum + value, 0);
  const totalDeviation = shockSize * Math.sqrt(horizon) * (1 / (1 - coefficient * 0.9));
  const weights = Array.from({ length: 26 }, (_, lag) => coefficient ** lag);
  const looks = 30;
  const path = (scale: number, end: number) =>
    Array.from(
      { length: looks },
      (_, look) => scale * shock(look * 17 + seed) * 0.4 + (end * look ** 3) / looks ** 3,
    );
  return {
    series: branch.series,
    unit: "loans",
    period: "week",
    history: { start, values: deviations.map((one) => Math.round(level + one)) },
    lastPeriod: "2026-11-30",
    observed: weeks,
    gaps: 0,
    forecast: {
      periods,
      point,
      median: point,
      intervals: [interval(80, 1.2816), interval(95, 1.96)],
      total: {
        point: total,
        intervals: [
          { level: 80, low: total - 1.2816 * totalDeviation, high: total + 1.2816 * totalDeviation },
          { level: 95, low: total - 1.96 * totalDeviation, high: total + 1.96 * totalDeviation },
        ],
      },
      chances:
        branch.limit === undefined
          ? []
          : [
              {
                direction: "above",
                limit: branch.limit,
                each: point.map((_, step) => 0.04 + 0.01 * step),
                any: 0.31,
              },
            ],
      candidates: [
        { name: "autoregression", weight: 0.7 },
        { name: "autoregression with trend", weight: 0.3 },
      ],
    },
    model: {
      scale: "raw",
      trend: false,
      season: 0,
      weight: 0.7,
      order: 1,
      coefficients: [coefficient],
      standardErrors: [0.07],
      persistence: coefficient,
      halfLife: Math.log(0.5) / Math.log(coefficient),
      halfLifeRange: {
        low: Math.log(0.5) / Math.log(coefficient - 0.1),
        high: coefficient > 0.85 ? null : Math.log(0.5) / Math.log(coefficient + 0.1),
      },
      longRunLevel: level,
      longRunLevelStandardError: shockSize / (1 - coefficient) / Math.sqrt(weeks),
      longRunStandardDeviation: shockSize / Math.sqrt(1 - coefficient ** 2),
      shockSize,
      rhythm: null,
      weights,
      residualAutocorrelations: Array.from({ length: 20 }, (_, lag) => shock(lag * 11 + seed) * 0.05),
      ljungBox: { statistic: 11.3, degreesOfFreedom: 13, pValue: 0.587 },
      fading: coefficient > 0.95 ? "cannot-tell" : "fades",
      observations: weeks,
    },
    comparison: {
      since: "2026-11-23T06:00:00Z",
      orderBefore: 1,
      orderAfter: 1,
      coefficients: [
        { lag: 1, before: coefficient - 0.02, after: coefficient, difference: 0.02, standardError: 0.04 },
      ],
      persistence: { before: coefficient - 0.02, after: coefficient },
      halfLife: {
        before: Math.log(0.5) / Math.log(coefficient - 0.02),
        after: Math.log(0.5) / Math.log(coefficient),
      },
    },
    attribution: {
      longRunLevel: level,
      shocks: Array.from({ length: 8 }, (_, back) => ({
        period: mondays("2026-11-30", 1).map((day) =>
          new Date(Date.parse(day) - back * 7 * 86_400_000).toISOString().slice(0, 10),
        )[0],
        shock: shocks[weeks - 1 - back],
        effects: periods.map((_, step) => shocks[weeks - 1 - back] * coefficient ** (step + 1 + back)),
      })),
    },
    monitor: {
      since: "2026-05-11",
      looksUsed: looks,
      looks: 52,
      falseAlarmRate: 0.05,
      paths: [
        { kind: "level", boundary: 2.2, statistics: path(0.5, 0.4) },
        { kind: "persistence", boundary: 1.5, statistics: path(0.4, branch.findings ? 1.9 : 0.3) },
        { kind: "shock-size", boundary: 3, statistics: path(0.6, 0.5) },
      ],
      state: "watching",
    },
    findings: branch.findings ?? [],
    trackRecord: {
      forecasts: 96,
      level: 80,
      insideRange: 75 + seed,
      meanAbsoluteError: 14.2,
      naiveMeanAbsoluteError: 18.9,
      byHorizon: periods.map((_, step) => ({
        step: step + 1,
        forecasts: 16 - step,
        insideRange: Math.round((16 - step) * 0.8),
        meanAbsoluteError: 10 + step,
        naiveMeanAbsoluteError: 12 + 2 * step,
      })),
    },
    backTest: { origins: 40, relativeError: 0.83, coverage80: 0.79 },
  };
}

export const quay = branchFacts({
  series: "Quay",
  level: 155,
  coefficient: 0.89,
  shockSize: 22,
  seed: 3,
  findings: [quayChange],
  lastShock: 38,
  limit: 260,
});
export const mill = branchFacts({ series: "Mill", level: 88, coefficient: 0.55, shockSize: 11, seed: 1 });
const park = branchFacts({ series: "Park", level: 120, coefficient: 0.4, shockSize: 14, seed: 2 });
export const station = branchFacts({
  series: "Station",
  level: 92,
  coefficient: 0.45,
  shockSize: 11,
  seed: 5,
  findings: [stationSurprise],
  lastShock: 56,
});

/** The run of Monday 7 December 2026 over the one table of loans. */
export const loansRun: RunFacts = {
  asOf: "2026-12-07T06:00:00Z",
  tables: [{ table: "loans", series: [quay, mill, park, station], problems: [] }],
  failed: [],
  left: [],
  expectedFalseNotices: 0.2,
  undelivered: [],
};
