import type { Problem } from "../series/series.ts";

/** One table that could not be refitted, and why. */
export interface FailedTable {
  readonly table: string;
  /** No table at all but a file beside them: known events, or the settings. */
  readonly beside?: boolean;
  /** Of a table: whether an earlier forecast of it stands. Not known where a worker reports, nor in earlier versions. */
  readonly hasForecast?: boolean;
  readonly problems: readonly Problem[];
}

/** The tables a run set out to do, cut into portions for workers; stored create-only as `runs/<asOf>/plan.json`. */
export interface Plan {
  readonly schema: 1;
  /** ISO instant, `2026-11-30T06:00:00Z`. */
  readonly asOf: string;
  readonly tables: readonly string[];
  readonly portions: readonly (readonly string[])[];
  /** Files whose names cannot be table names. */
  readonly refused: readonly FailedTable[];
  /** Tables of the last run that are there no more. */
  readonly gone?: readonly string[];
  /** Made by a replay, whose messages are posted to nobody. */
  readonly replayed?: boolean;
}

/** What one worker did with its portion. */
export interface PortionResult {
  readonly refitted: readonly string[];
  /** Found already written by an earlier try. */
  readonly already: readonly string[];
  readonly failed: readonly FailedTable[];
  /** Not reached before the time ran out. */
  readonly left: readonly string[];
  readonly series: number;
}

export interface DeliveryRecord {
  readonly webhook: string;
  readonly audience: "business" | "analyst" | "operations";
  readonly asOf: string;
  readonly status: "delivered" | "already-delivered" | "undelivered" | "not-configured" | "nothing-to-say";
  readonly reason?: string;
}

/** What a run did, for its caller. */
export interface RunSummary {
  readonly schema: 1;
  readonly asOf: string;
  readonly tables: number;
  readonly series: number;
  readonly notices: number;
  readonly surprises: number;
  readonly stale: readonly string[];
  readonly failed: readonly FailedTable[];
  readonly left: readonly string[];
  /** Tables of the run before that are there no more; absent in summaries of earlier versions. */
  readonly gone?: readonly string[];
  readonly deliveries: readonly DeliveryRecord[];
  /** Key of the report in the store. */
  readonly report: string;
  readonly durationMilliseconds: number;
}

/** What `runs/<asOf>/summary.json` holds: nothing of the clock or of one try, so that a retry writes the same bytes. */
export type LastingSummary = Omit<RunSummary, "durationMilliseconds" | "deliveries">;
