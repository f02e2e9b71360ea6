import { asOfKey } from "../lib/job/keys.ts";
import { refitPortion } from "../lib/job/refit.ts";
import { type Cloud, ownCloud } from "./cloud/cloud.ts";
import { portionRequest } from "./cloud/events.ts";
import type { LambdaContext } from "./cloud/lambda.ts";
import { jsonLog } from "./cloud/log.ts";
import { UnfinishedError } from "./cloud/report.ts";

/** A worker's answer: counts, and the names of what failed. */
export interface PortionOutcome {
  readonly outcome: "refitted";
  readonly tables: number;
  readonly refitted: number;
  /** Done by an earlier try of this run. */
  readonly already: number;
  readonly series: number;
  readonly failed: readonly string[];
}

/**
 * One worker of the fleet: refits the tables of the portions it is given and writes their documents.
 *
 * A table that fails is named in the answer and does not fail the worker. With the time running low it throws
 * `UnfinishedError`: Step Functions invokes it again with the same portions, and tables already done are skipped.
 *
 * @throws EventError, SettingsError, StoreError, UnfinishedError
 */
export function handler(event: unknown, context: LambdaContext): Promise<PortionOutcome> {
  return runPortion(event, context, ownCloud());
}

/** The handler on a given cloud. */
export async function runPortion(
  event: unknown,
  context: LambdaContext,
  cloud: Cloud,
): Promise<PortionOutcome> {
  const { asOf, tables } = portionRequest(event);
  const log = jsonLog(cloud.write, cloud.clock, { runId: asOfKey(asOf), requestId: context.awsRequestId });
  const began = cloud.clock();
  const result = await refitPortion({
    store: cloud.store,
    asOf,
    tables,
    remainingMilliseconds: () => context.getRemainingTimeInMillis(),
    clock: cloud.clock,
  });
  const outcome: PortionOutcome = {
    outcome: "refitted",
    tables: tables.length,
    refitted: result.refitted.length,
    already: result.already.length,
    series: result.series,
    failed: result.failed.map(({ table }) => table),
  };
  log.info("a portion is done", {
    ...outcome,
    left: result.left.length,
    milliseconds: Math.round(cloud.clock() - began),
  });
  if (result.left.length > 0)
    throw new UnfinishedError(`${result.left.length} tables of the portion are left: the next try goes on`);
  return outcome;
}
