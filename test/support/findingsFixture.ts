import type { Finding } from "../../lib/words/facts.ts";

/** Quay's shocks, once gone in two weeks, now take about six to lose half their effect. */
export const quayChange: Extract<Finding, { code: "change" }> = {
  code: "change",
  kind: "persistence",
  alternative: null,
  status: "provisional",
  fresh: true,
  noticed: "2026-11-30",
  change: { period: "2026-09-21", low: "2026-08-31", high: "2026-10-12" },
  before: {
    order: 1,
    coefficients: [0.71],
    persistence: 0.71,
    halfLife: 2.02,
    level: 151,
    slope: 0,
    shockSize: 21,
    observations: 78,
  },
  after: {
    order: 1,
    coefficients: [0.89],
    persistence: 0.89,
    halfLife: 5.9,
    level: 158,
    slope: 0,
    shockSize: 22,
    observations: 11,
  },
  evidence: { statistic: 2.31, boundary: 1.52, looksUsed: 30, looks: 52, falseAlarmRate: 0.05 },
};

/** One odd week at Station: a fair borrowed far more than usual. */
export const stationSurprise: Extract<Finding, { code: "surprise" }> = {
  code: "surprise",
  period: "2026-11-30",
  value: 148,
  expected: 92,
  size: 5.1,
  remaining: [
    { after: 1, period: "2026-12-07", amount: 25.2 },
    { after: 4, period: "2026-12-28", amount: 2.3 },
  ],
};
