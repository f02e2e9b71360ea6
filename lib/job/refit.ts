import type { ObjectStore } from "../store/objectStore.ts";
import { asOfText } from "./keys.ts";
import { loadEvents } from "./loadEvents.ts";
import { loadSettings } from "./loadSettings.ts";
import type { Progress } from "./progress.ts";
import { refitTable } from "./refitTable.ts";
import type { Settings } from "./settings.ts";
import type { FailedTable, PortionResult } from "./summary.ts";

export interface RefitOptions {
  readonly store: ObjectStore;
  readonly asOf: Date | string;
  readonly tables: readonly string[];
  readonly settings?: Settings;
  /** What is left of the time this worker may take; without it there is no limit. */
  readonly remainingMilliseconds?: () => number;
  /** Milliseconds since any fixed moment; only differences are used. */
  readonly clock?: () => number;
  readonly progress?: (progress: Progress) => void;
}

/** Time kept back for closing the run: the digest, the report and the deliveries. */
const closingMilliseconds = 30_000;

/** Tables under way at once: while one is computed, others are read and written. */
const underWay = 4;

/**
 * Refits every table of a portion. A table that fails is reported and the rest go on. With the time running low it
 * takes no further table: those left are named in the result, and a retry of the same run goes on from there.
 *
 * @throws StoreError when the store itself fails
 */
export async function refitPortion(options: RefitOptions): Promise<PortionResult> {
  const { store, tables, remainingMilliseconds, clock, progress } = options;
  const asOf = asOfText(options.asOf);
  const settings = options.settings ?? (await loadSettings(store));
  const { events } = await loadEvents(store, settings, asOf);
  const refitted: string[] = [];
  const already: string[] = [];
  const failed: FailedTable[] = [];
  let series = 0;
  let next = 0;
  let done = 0;
  let slowest = 0;
  let faulty = false;
  const inTime = () => !remainingMilliseconds || remainingMilliseconds() >= closingMilliseconds + 2 * slowest;

  async function takeTables(): Promise<void> {
    while (next < tables.length && !faulty && inTime()) {
      const table = tables[next++];
      const began = clock?.() ?? 0;
      const outcome = await refitTable({ store, asOf, table, settings, events });
      slowest = Math.max(slowest, (clock?.() ?? 0) - began);
      if (outcome.status === "failed") failed.push({ table, problems: outcome.problems });
      else {
        (outcome.status === "refitted" ? refitted : already).push(table);
        series += outcome.series;
      }
      progress?.({ stage: "table", table, done: ++done, of: tables.length });
    }
  }
  const takers = Array.from({ length: Math.min(underWay, tables.length) }, () =>
    takeTables().catch((error: unknown) => {
      faulty = true;
      throw error;
    }),
  );
  // All are waited for, so that nothing is still being written when a fault is told.
  const ends = await Promise.allSettled(takers);
  for (const end of ends) if (end.status === "rejected") throw end.reason;
  const byName = (a: FailedTable, b: FailedTable) => (a.table < b.table ? -1 : 1);
  return {
    refitted: refitted.sort(),
    already: already.sort(),
    failed: failed.sort(byName),
    left: tables.slice(next),
    series,
  };
}
