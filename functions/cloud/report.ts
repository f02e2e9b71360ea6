import type { RunSummary } from "../../lib/job/summary.ts";
import type { Cloud } from "./cloud.ts";
import type { Log } from "./log.ts";
import { runMetrics } from "./metrics.ts";

/** A handler's answer: short, because an answer may hold 256 KB and the whole stands in the store. */
export interface RunOutcome {
  readonly outcome: "closed";
  readonly asOf: string;
  /** Who did the work: this function alone, or a fleet. */
  readonly by: "one function" | "fleet";
  /** Why it was the fleet. */
  readonly because?: string | undefined;
  readonly tables: number;
  readonly series: number;
  readonly notices: number;
  readonly failed: readonly string[];
  readonly failedCount: number;
  readonly left: number;
  readonly deliveries: readonly string[];
}

/** Names beyond these are counted, not written out. */
const mostNames = 50;

/** Tables are left over: thrown so that Lambda or Step Functions tries the same run again, which goes on from there. */
export class UnfinishedError extends Error {
  override readonly name = "UnfinishedError";
}

/** Writes a finished run's log lines and metrics and returns the short answer. */
export function reportRun(
  cloud: Cloud,
  log: Log,
  summary: RunSummary,
  by: RunOutcome["by"],
  because?: string,
): RunOutcome {
  for (const { table, problems } of summary.failed.slice(0, mostNames))
    log.warn("a table could not be refitted", { table, codes: problems.map(({ code }) => code) });
  for (const table of (summary.gone ?? []).slice(0, mostNames))
    log.warn("a table of the last run is not there any more", { table });
  for (const { webhook, audience, status, asOf } of summary.deliveries) {
    const fields = { webhook, audience, status, messageOf: asOf };
    if (status === "undelivered")
      log.error("a message was not delivered: it goes out with the next run", fields);
    else if (status === "not-configured")
      log.warn("a webhook has no address or key yet and gets nothing", fields);
    else log.info("a message was dealt with", fields);
  }
  log.document(runMetrics(summary, cloud.deployment, cloud.clock()));
  const { asOf, tables, series, notices } = summary;
  const failed = summary.failed.slice(0, mostNames).map(({ table }) => table);
  const deliveries = summary.deliveries.map(({ webhook, status }) => `${webhook}: ${status}`);
  const left = summary.left.length;
  log.info("the run is closed", {
    by,
    because,
    tables,
    series,
    notices,
    failed: summary.failed.length,
    left,
  });
  return {
    outcome: "closed",
    asOf,
    by,
    ...(because === undefined ? {} : { because }),
    tables,
    series,
    notices,
    failed,
    failedCount: summary.failed.length,
    left,
    deliveries,
  };
}
