import { asOfKey } from "../lib/job/keys.ts";
import { closeRun } from "../lib/job/run.ts";
import { type Cloud, ownCloud } from "./cloud/cloud.ts";
import { closingRequest } from "./cloud/events.ts";
import type { LambdaContext } from "./cloud/lambda.ts";
import { jsonLog } from "./cloud/log.ts";
import { readSecret } from "./cloud/readSecret.ts";
import { type RunOutcome, reportRun } from "./cloud/report.ts";
import { secretsOf } from "./cloud/secrets.ts";

/**
 * Ends a fleet's run: reads what the workers wrote, words one message an audience, draws the report, delivers.
 * Tables that no worker finished are named in the message. May be repeated: what was delivered stays delivered.
 *
 * @throws EventError, SettingsError, StoreError
 */
export function handler(event: unknown, context: LambdaContext): Promise<RunOutcome> {
  return runClosing(event, context, ownCloud({ readSecret }));
}

/** The handler on a given cloud. */
export async function runClosing(event: unknown, context: LambdaContext, cloud: Cloud): Promise<RunOutcome> {
  const { asOf, startedAt, because } = closingRequest(event);
  const log = jsonLog(cloud.write, cloud.clock, { runId: asOfKey(asOf), requestId: context.awsRequestId });
  const summary = await closeRun({
    store: cloud.store,
    asOf,
    secrets: secretsOf(cloud.readSecret, cloud.environment, log),
    remainingMilliseconds: () => context.getRemainingTimeInMillis(),
    clock: cloud.clock,
    owner: context.awsRequestId,
    startedAt: startedAt === undefined ? undefined : Date.parse(startedAt),
  });
  return reportRun(cloud, log, summary, "fleet", because);
}
