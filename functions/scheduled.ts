import { asOfKey } from "../lib/job/keys.ts";
import { loadSettings } from "../lib/job/loadSettings.ts";
import { NoTablesError } from "../lib/job/noTables.ts";
import { planRun } from "../lib/job/plan.ts";
import { refitPortion } from "../lib/job/refit.ts";
import { closeRun, OutdatedRunError, runJob } from "../lib/job/run.ts";
import { readRunHistory } from "../lib/job/runHistory.ts";
import type { Settings } from "../lib/job/settings.ts";
import type { Plan, RunSummary } from "../lib/job/summary.ts";
import { type Cloud, ownCloud } from "./cloud/cloud.ts";
import { scheduledRequest } from "./cloud/events.ts";
import { type HandedOver, handOver } from "./cloud/handOver.ts";
import type { LambdaContext } from "./cloud/lambda.ts";
import { jsonLog, type Log } from "./cloud/log.ts";
import { outgrown } from "./cloud/outgrown.ts";
import { readSecret } from "./cloud/readSecret.ts";
import { type RunOutcome, reportRun, UnfinishedError } from "./cloud/report.ts";
import { secretsOf } from "./cloud/secrets.ts";
import { startFleet } from "./cloud/startFleet.ts";
import { type Watched, watchRuns } from "./cloud/watch.ts";

/** A repeated trigger that came after a newer run: there is nothing left to do for it. */
interface Outdated {
  readonly outcome: "outdated";
  readonly asOf: string;
}

/** No table was dropped into the store yet: there is nothing to do, and trying again would not change it. */
interface WithoutTables {
  readonly outcome: "no tables";
  readonly asOf: string;
}

/**
 * The function the schedule invokes, at least once a period: `{ "asOf": "2026-11-30T06:00:00Z" }`.
 *
 * One function does the whole run where it can. Where the deployment has a fleet, it hands the run over at once
 * ("always"), or as soon as the pace shows that its time will not do ("auto"). With neither, and time running
 * out, it closes what it has and throws `UnfinishedError`: Lambda invokes it again with the same event and it
 * goes on from there. The same event any number of times gives one run and one message.
 *
 * @throws EventError, SettingsError, StoreError, UnfinishedError
 */
export function handler(event: unknown, context: LambdaContext) {
  return runScheduled(event, context, ownCloud({ readSecret, startFleet }));
}

/** The handler on a given cloud. */
export async function runScheduled(
  event: unknown,
  context: LambdaContext,
  cloud: Cloud,
): Promise<RunOutcome | HandedOver | Watched | Outdated | WithoutTables> {
  const request = scheduledRequest(event, new Date(cloud.clock()));
  const common = { requestId: context.awsRequestId };
  if (request.kind === "watch")
    return watchRuns(cloud, jsonLog(cloud.write, cloud.clock, common), request.withinHours);
  const { asOf } = request;
  const log = jsonLog(cloud.write, cloud.clock, { runId: asOfKey(asOf), ...common });
  try {
    return cloud.fleet === "never"
      ? finish(cloud, log, await runJob(runOptions(cloud, log, context, asOf)))
      : await runWithFleet(cloud, log, context, asOf);
  } catch (error) {
    if (error instanceof OutdatedRunError) {
      log.warn("a newer run stands: this late trigger is let be");
      return { outcome: "outdated", asOf };
    }
    if (error instanceof NoTablesError) {
      log.warn("there are no tables under series/ yet: nothing was done");
      return { outcome: "no tables", asOf };
    }
    log.error("the run is not done", { error: error instanceof Error ? error.name : "unknown" });
    throw error;
  }
}

async function runWithFleet(cloud: Cloud, log: Log, context: LambdaContext, asOf: string) {
  const began = cloud.clock();
  const { newest } = await readRunHistory(cloud.store, asOf, new Date(began));
  if (newest !== undefined && newest > asOf) throw new OutdatedRunError(`a run at ${newest} stands`);
  const settings = await loadSettings(cloud.store);
  const plan = await planRun({ store: cloud.store, asOf, settings });
  if (cloud.fleet === "always") return handOver(cloud, log, plan, "chosen for this deployment");
  if (!(await refitAlone(cloud, context, plan, settings)))
    return handOver(cloud, log, plan, "more work than one function has time for");
  const summary = await closeRun({ ...runOptions(cloud, log, context, asOf), settings, startedAt: began });
  return finish(cloud, log, summary);
}

/** Refits portion after portion; `false` as soon as the pace shows that the time will not do. */
async function refitAlone(
  cloud: Cloud,
  context: LambdaContext,
  plan: Plan,
  settings: Settings,
): Promise<boolean> {
  const { store, clock } = cloud;
  const remainingMilliseconds = () => context.getRemainingTimeInMillis();
  const began = clock();
  let doneTables = 0;
  for (const tables of plan.portions) {
    const pace = { doneTables, leftTables: plan.tables.length - doneTables };
    const time = { elapsedMilliseconds: clock() - began, remainingMilliseconds: remainingMilliseconds() };
    if (outgrown({ ...pace, ...time })) return false;
    const { left } = await refitPortion({
      store,
      asOf: plan.asOf,
      tables,
      settings,
      remainingMilliseconds,
      clock,
    });
    if (left.length > 0) return false;
    doneTables += tables.length;
  }
  return true;
}

function runOptions(cloud: Cloud, log: Log, context: LambdaContext, asOf: string) {
  return {
    store: cloud.store,
    asOf,
    secrets: secretsOf(cloud.readSecret, cloud.environment, log),
    remainingMilliseconds: () => context.getRemainingTimeInMillis(),
    clock: cloud.clock,
    owner: context.awsRequestId,
  };
}

function finish(cloud: Cloud, log: Log, summary: RunSummary): RunOutcome {
  const outcome = reportRun(cloud, log, summary, "one function");
  if (outcome.left > 0)
    throw new UnfinishedError(
      `${outcome.left} tables are left: the time ran out, the next try goes on from there`,
    );
  return outcome;
}
