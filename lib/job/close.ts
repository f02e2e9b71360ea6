import { renderReport } from "../report/renderReport.ts";
import type { ObjectStore } from "../store/objectStore.ts";
import type { RunFacts, Voice } from "../words/facts.ts";
import { gatherGone, gatherTables, runFacts } from "./digest.ts";
import { encodeText } from "./documents.ts";
import { runPrefix } from "./keys.ts";
import {
  type Audience,
  audiences,
  createMessage,
  type MessageDocument,
  partName,
  readMessageParts,
} from "./messages.ts";
import { type OwedMessage, readOwedMessages } from "./owedMessages.ts";
import { type PostingContext, postMessage } from "./postMessage.ts";
import type { Settings } from "./settings.ts";
import type { DeliveryRecord, FailedTable, LastingSummary, Plan } from "./summary.ts";
import { voiceOf } from "./voice.ts";

export interface Closing {
  readonly store: ObjectStore;
  readonly plan: Plan;
  readonly settings: Settings;
  readonly posting: PostingContext;
  /** First marks of notes that earlier runs could not deliver. */
  readonly undelivered: readonly string[];
  /** The summary of an earlier try, if one came so far. */
  readonly standing: LastingSummary | undefined;
  /** How long the run has taken so far. */
  readonly elapsedMilliseconds: () => number;
}

export interface Closed {
  readonly facts: RunFacts;
  readonly report: string;
  readonly deliveries: readonly DeliveryRecord[];
  /** The report and summary that stand tell of the same tables; they were left alone. */
  readonly reported: boolean;
}

/** The parts of one audience's message, with a new part for tables that no part speaks of yet. */
async function messageParts(
  closing: Closing,
  facts: RunFacts,
  voice: Voice,
  audience: Audience,
): Promise<MessageDocument[]> {
  const { store, plan } = closing;
  const parts = await readMessageParts(store, plan.asOf, audience);
  for (;;) {
    const told = new Set(parts.flatMap((part) => part.tables));
    const isNew = ({ table }: { table: string }) => !told.has(table);
    const tables = facts.tables.filter(isNew);
    const failed = facts.failed.filter(isNew);
    if (parts.length > 0 && tables.length + failed.length === 0) return parts;
    const durationMilliseconds = audience === "operations" ? closing.elapsedMilliseconds() : undefined;
    const gone = parts.length === 0 ? facts.gone : [];
    const rest = { ...facts, tables, failed, gone, durationMilliseconds };
    // Another process may have been first, with fewer tables: then theirs stands and one more part follows.
    parts.push(await createMessage(store, rest, voice, audience, parts.length + 1));
  }
}

/** Whether the report that stands tells of the same tables. */
function isReported(standing: LastingSummary | undefined, facts: RunFacts): boolean {
  const names = (failed: readonly FailedTable[]) => failed.map(({ table }) => table).join("\n");
  return standing?.left.length === 0 && names(standing.failed) === names(facts.failed);
}

/**
 * Ends a run: gathers what the workers wrote, words the messages (once), draws the report, posts what is owed from
 * earlier runs and then this run's messages.
 *
 * May be repeated at any time: messages that stand are not worded again, and what was delivered is not posted again.
 * Every message stands before the first one is posted, so that a crash in between changes no word.
 */
export async function closeTables(closing: Closing): Promise<Closed> {
  const { store, plan, settings, posting } = closing;
  const owed = await readOwedMessages(store, closing.undelivered, posting.webhooks);
  const facts = runFacts(
    plan,
    await gatherTables(store, plan.asOf, plan.tables),
    await gatherGone(store, plan),
    owed.map(({ message, webhook }) => ({ asOf: message.asOf, webhook: webhook.name })),
  );
  const voice = voiceOf(settings);
  const reported = isReported(closing.standing, facts);
  if (!reported)
    for (const page of renderReport({ ...facts, undelivered: [] }, voice))
      await store.write(`${runPrefix(plan.asOf)}${page.key}`, encodeText(page.html));

  const toPost: OwedMessage[] = [...owed];
  for (const audience of audiences) {
    const listeners = posting.webhooks.filter((webhook) => webhook.audience === audience);
    if (audience === "operations" && listeners.length === 0) continue;
    const parts = await messageParts(closing, facts, voice, audience);
    for (const [index, message] of parts.entries())
      for (const webhook of listeners) toPost.push({ message, part: partName(audience, index + 1), webhook });
  }
  const deliveries: DeliveryRecord[] = [];
  for (const { message, part, webhook } of toPost)
    deliveries.push(await postMessage(posting, message, part, webhook));
  return { facts, report: `${runPrefix(plan.asOf)}report.html`, deliveries, reported };
}
