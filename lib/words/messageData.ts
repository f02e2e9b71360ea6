import type { Ranked } from "./attention.ts";
import type { RunFacts } from "./facts.ts";
import { hasTotal } from "./forecastSentences.ts";
import { plainName } from "./plainText.ts";
import { spokenInterval } from "./speech.ts";

/** Bytes of JSON that the facts in a message may take: a receiver's budget is 20 KB with lines and escapes. */
const budget = 12_000;

/**
 * The note as data for receivers that are programs, most changed first; series beyond the budget are counted in
 * `omitted`, and `summary.json` of the run holds them all.
 */
export function messageData(
  run: RunFacts,
  audience: "business" | "analyst" | "operations",
  all: readonly Ranked[],
) {
  const series: ReturnType<typeof seriesData>[] = [];
  let bytes = 0;
  for (const one of all) {
    const data = seriesData(one);
    bytes += new TextEncoder().encode(JSON.stringify(data)).length;
    if (bytes > budget) break;
    series.push(data);
  }
  return {
    schema: 1,
    audience,
    asOf: run.asOf,
    series,
    omitted: all.length - series.length + (run.untold?.steady ?? 0) + (run.untold?.news ?? 0),
    failed: run.failed.slice(0, 20).map((one) => plainName(one.table, 120)),
    left: run.left.length,
    gone: (run.gone ?? []).slice(0, 20).map((one) => plainName(one.table, 120)),
    expectedFalseNotices: run.expectedFalseNotices,
  };
}

function seriesData({ table, facts }: Ranked) {
  const { forecast, findings } = facts;
  const next = spokenInterval(forecast.intervals);
  const total = spokenInterval(forecast.total.intervals);
  return {
    table: plainName(table.table, 120),
    series: plainName(facts.series, 120),
    unit: facts.unit === null ? null : plainName(facts.unit, 40),
    every: facts.period,
    next: {
      period: forecast.periods[0],
      forecast: forecast.point[0],
      level: next.level,
      low: next.low[0],
      high: next.high[0],
    },
    total: hasTotal(facts)
      ? {
          periods: forecast.periods.length,
          forecast: forecast.total.point,
          level: total.level,
          low: total.low,
          high: total.high,
        }
      : null,
    halfLife: facts.model.halfLife,
    persistence: facts.model.persistence,
    changes: findings.flatMap((one) =>
      one.code === "change" && one.fresh
        ? [{ kind: one.kind, alternative: one.alternative, status: one.status, since: one.change.period }]
        : [],
    ),
    surprises: findings.flatMap((one) =>
      one.code === "surprise" ? [{ period: one.period, value: one.value, expected: one.expected }] : [],
    ),
    late: findings.some((one) => one.code === "stale"),
  };
}
