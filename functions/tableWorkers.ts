import { once } from "node:events";
import { Worker } from "node:worker_threads";
import type { RefitOptions } from "../lib/job/refit.ts";
import type { Settings } from "../lib/job/settings.ts";
import type { PortionResult } from "../lib/job/summary.ts";
import { StoreError } from "../lib/store/objectStore.ts";

/** What a thread is handed. */
export interface WorkerTask {
  readonly asOf: string;
  readonly tables: readonly string[];
  readonly settings?: Settings;
}

export type WorkerAnswer =
  | { readonly result: PortionResult }
  /** What a thread could not go on from; `store` when it was the store's. */
  | { readonly fault: string; readonly store?: Pick<StoreError, "action" | "key"> };

/** The fault of a thread as this thread would have thrown it. */
function faultOf(answer: Extract<WorkerAnswer, { fault: string }>): Error {
  if (!answer.store) return new Error(answer.fault);
  const { action, key } = answer.store;
  return Object.assign(new StoreError("", action, key, undefined), { message: answer.fault });
}

/** Tables handed out at a time: few, so that no thread is left with all the slow ones. */
const tablesAtOnce = 2;

/**
 * A way to refit tables on several threads, for `runJob`'s `refit`. The store is opened anew in each thread by its
 * address. Threads live as long as the call.
 */
export function refitOnThreads(
  address: string,
  threads: number,
): (options: RefitOptions) => Promise<PortionResult> {
  return async ({ asOf, tables, settings, progress }) => {
    const instant = typeof asOf === "string" ? asOf : asOf.toISOString();
    const results: PortionResult[] = [];
    let next = 0;
    let done = 0;
    async function serve(): Promise<void> {
      const worker = new Worker(new URL("./tableWorker.js", import.meta.url), { workerData: address });
      try {
        while (next < tables.length) {
          const handed = tables.slice(next, next + tablesAtOnce);
          next += handed.length;
          worker.postMessage({ asOf: instant, tables: handed, settings } satisfies WorkerTask);
          const [answer] = (await once(worker, "message")) as [WorkerAnswer];
          if ("fault" in answer) throw faultOf(answer);
          results.push(answer.result);
          done += handed.length;
          progress?.({ stage: "table", table: handed[handed.length - 1], done, of: tables.length });
        }
      } finally {
        await worker.terminate();
      }
    }
    // All are waited for, so that nothing is still being written when a fault is told.
    const servers = Array.from({ length: Math.min(threads, tables.length) }, () =>
      serve().catch((error: unknown) => {
        next = tables.length;
        throw error;
      }),
    );
    for (const end of await Promise.allSettled(servers)) if (end.status === "rejected") throw end.reason;
    return {
      refitted: results.flatMap((result) => result.refitted).sort(),
      already: results.flatMap((result) => result.already).sort(),
      failed: results.flatMap((result) => result.failed).sort((a, b) => (a.table < b.table ? -1 : 1)),
      left: [],
      series: results.reduce((sum, result) => sum + result.series, 0),
    };
  };
}
