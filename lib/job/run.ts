import { randomUUID } from "node:crypto";
import { setTimeout as sleepFor } from "node:timers/promises";
import type { ObjectStore } from "../store/objectStore.ts";
import type { Finding, RunFacts, SeriesFacts } from "../words/facts.ts";
import { isNewOrConfirmed } from "../words/freshness.ts";
import { closeTables } from "./close.ts";
import { encodeDocument, readDocument } from "./documents.ts";
import { asOfText, runPrefix, summaryKey } from "./keys.ts";
import { completeSettings, loadSettings } from "./loadSettings.ts";
import { planRun } from "./plan.ts";
import type { Progress } from "./progress.ts";
import { type RefitOptions, refitPortion } from "./refit.ts";
import { readRunHistory } from "./runHistory.ts";
import type { Settings, SettingsInput } from "./settings.ts";
import type { DeliveryRecord, LastingSummary, Plan, PortionResult, RunSummary } from "./summary.ts";
import { completeWebhook, type Secrets, type WebhookInput } from "./webhooks.ts";

export interface RunOptions {
  readonly store: ObjectStore;
  /** The instant the run stands at: only periods that were complete by then count. */
  readonly asOf: Date | string;
  /** Instead of the store's `settings.json`; what is left out has its default. */
  readonly settings?: SettingsInput;
  /** Instead of the settings' webhooks; an address may stand here itself. */
  readonly webhooks?: readonly WebhookInput[];
  /** Looks up `env:NAME` and `secret:NAME`; without it such webhooks are not configured. */
  readonly secrets?: Secrets;
  /** Lets webhooks be plain http on this machine: for tests and demos. */
  readonly allowLocalWebhooks?: boolean;
  /** Lets `asOf` be older than the newest run. */
  readonly replaying?: boolean;
  /** What is left of the time this process may take. */
  readonly remainingMilliseconds?: () => number;
  /** Milliseconds since 1970. */
  readonly clock?: () => number;
  /** For `closeRun`: when the run began, by the same clock. */
  readonly startedAt?: number;
  readonly sleep?: (milliseconds: number) => Promise<void>;
  /** Instead of refitting in this thread. */
  readonly refit?: (options: RefitOptions) => Promise<PortionResult>;
  /** Names this process among others at work on the same run. */
  readonly owner?: string;
  readonly progress?: (progress: Progress) => void;
}

/** The longest one webhook may keep a run waiting, retries included. */
const longestPost = 20_000;
/** What every webhook gets, however late it is: one that works answers within a second or two. */
const shortestPost = 2_000;
/** Time kept back for what follows the posts: proofs, marks and the summary. */
const afterPosts = 5_000;

/** How long the next post may take: with several silent webhooks and the time running low, ever less. */
function postMilliseconds({ remainingMilliseconds }: RunOptions): number {
  if (!remainingMilliseconds) return longestPost;
  return Math.min(longestPost, Math.max(shortestPost, remainingMilliseconds() - afterPosts));
}

/** `asOf` lies before the newest run: its forecasts would be older than those that stand. */
export class OutdatedRunError extends Error {
  override readonly name = "OutdatedRunError";
}

async function prepare(options: RunOptions) {
  const clock = options.clock ?? Date.now;
  const asOf = asOfText(options.asOf);
  const settings = options.settings ? completeSettings(options.settings) : await loadSettings(options.store);
  const history = await readRunHistory(options.store, asOf, new Date(clock()));
  if (!options.replaying && history.newest !== undefined && history.newest > asOf)
    throw new OutdatedRunError(
      `a run at ${history.newest} stands in ${options.store.address}, later than this one at ${asOf}: wait until then, or replay the past with --replaying`,
    );
  const undelivered = history.undelivered.filter((key) => key < runPrefix(asOf));
  return { clock, asOf, settings, undelivered };
}

/**
 * One pass over all tables of a store at one instant: reads, refits, forecasts, watches for drift, writes, and
 * posts what there is to say.
 *
 * Repeating a run with the same `asOf` writes nothing new and posts nothing that was delivered; after a crash it
 * goes on where the first try stopped. Two runs at once give the same documents and one message. A table that fails
 * does not stop the others.
 *
 * @throws SettingsError when settings.json cannot be used, NoTablesError, OutdatedRunError, StoreError
 */
export async function runJob(options: RunOptions): Promise<RunSummary> {
  const { store, remainingMilliseconds, progress } = options;
  const { clock, asOf, settings, undelivered } = await prepare(options);
  const began = clock();
  const replayed = options.replaying === true && options.webhooks?.length === 0;
  const plan = await planRun({ store, asOf, settings, replayed });
  const refit = options.refit ?? refitPortion;
  await refit({ store, asOf, tables: plan.tables, settings, remainingMilliseconds, clock, progress });
  return close({ ...options, settings }, plan, clock, began, undelivered);
}

/** Ends a run whose tables other workers refitted: the messages, the report, the deliveries. */
export async function closeRun(options: RunOptions): Promise<RunSummary> {
  const { clock, asOf, settings, undelivered } = await prepare({ ...options, replaying: true });
  const plan = await planRun({ store: options.store, asOf, settings });
  return close({ ...options, settings }, plan, clock, options.startedAt ?? clock(), undelivered);
}

async function close(
  options: RunOptions & { settings: Settings },
  plan: Plan,
  clock: () => number,
  began: number,
  undelivered: readonly string[],
): Promise<RunSummary> {
  const { store, settings } = options;
  const standing = await readDocument<LastingSummary>(store, summaryKey(plan.asOf));
  const { facts, report, deliveries, reported } = await closeTables({
    store,
    plan,
    settings,
    undelivered,
    standing,
    elapsedMilliseconds: () => clock() - began,
    posting: {
      store,
      webhooks: options.webhooks?.map(completeWebhook) ?? settings.webhooks,
      secrets: options.secrets,
      allowLocal: options.allowLocalWebhooks ?? false,
      quietWhenSteady: settings.quietWhenSteady,
      owner: options.owner ?? randomUUID(),
      clock,
      sleep: options.sleep ?? sleepFor,
      postMilliseconds: () => postMilliseconds(options),
    },
  });
  const summary = summarise(facts, report, deliveries, clock() - began);
  // What depends on the clock or on this try alone stays out, so that a repeated run writes the same bytes.
  const { durationMilliseconds: _duration, deliveries: _deliveries, ...lasting } = summary;
  if (!reported) await store.write(summaryKey(plan.asOf), encodeDocument(lasting satisfies LastingSummary));
  return summary;
}

function summarise(
  facts: RunFacts,
  report: string,
  deliveries: readonly DeliveryRecord[],
  durationMilliseconds: number,
): RunSummary {
  const all = facts.tables.flatMap((table) => table.series);
  const count = (told: (facts: SeriesFacts, finding: Finding) => boolean) =>
    all.reduce((sum, series) => sum + series.findings.filter((finding) => told(series, finding)).length, 0);
  const { untold = { steady: 0, news: 0 } } = facts;
  const isStale = (table: RunFacts["tables"][number]) =>
    table.series.some((series) => series.findings.some((finding) => finding.code === "stale"));
  return {
    schema: 1,
    asOf: facts.asOf,
    tables: facts.tables.length,
    series: facts.tables.reduce((sum, table) => sum + table.series.length, untold.steady + untold.news),
    notices: count((facts, finding) => finding.code === "change" && isNewOrConfirmed(finding, facts)),
    surprises: count((facts, finding) => finding.code === "surprise" && finding.period === facts.lastPeriod),
    stale: facts.tables.filter(isStale).map((table) => table.table),
    failed: facts.failed,
    left: facts.left,
    gone: facts.gone?.map(({ table }) => table) ?? [],
    deliveries,
    report,
    durationMilliseconds,
  };
}
