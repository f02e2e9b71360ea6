import type { ObjectStore } from "../store/objectStore.ts";
import type { Message } from "../webhook/message.ts";
import { analystMessage } from "../words/analystMessage.ts";
import { businessMessage } from "../words/businessMessage.ts";
import type { RunFacts, Voice } from "../words/facts.ts";
import { hasNews } from "../words/hasNews.ts";
import { operationsMessage } from "../words/operationsMessage.ts";
import { createDocument, readDocument, type Versioned } from "./documents.ts";
import { runPrefix } from "./keys.ts";
import type { DeliveryRecord } from "./summary.ts";

export type Audience = DeliveryRecord["audience"];
export const audiences: readonly Audience[] = ["business", "analyst", "operations"];

/** `runs/<asOf>/message-<audience>.json`: what the run says, written once. */
export interface MessageDocument extends Versioned {
  readonly asOf: string;
  readonly audience: Audience;
  /** Tables this part speaks of; a run that ran out of time says the rest in a later part. */
  readonly tables: readonly string[];
  readonly hasNews: boolean;
  readonly message: Message;
}

const compose = { business: businessMessage, analyst: analystMessage, operations: operationsMessage };

export const partName = (audience: Audience, part: number) =>
  part === 1 ? audience : `${audience}-part${part}`;

const messageKey = (asOf: string, audience: Audience, part: number) =>
  `${runPrefix(asOf)}message-${partName(audience, part)}.json`;

/** The parts written so far, in order. Usually one. */
export async function readMessageParts(
  store: ObjectStore,
  asOf: string,
  audience: Audience,
): Promise<MessageDocument[]> {
  const parts: MessageDocument[] = [];
  for (;;) {
    const part = await readDocument<MessageDocument>(store, messageKey(asOf, audience, parts.length + 1));
    if (!part) return parts;
    parts.push(part);
  }
}

/** Writes one part of what the run says to one audience; the first writer's words stand. */
export function createMessage(
  store: ObjectStore,
  run: RunFacts,
  voice: Voice,
  audience: Audience,
  part: number,
): Promise<MessageDocument> {
  return createDocument<MessageDocument>(store, messageKey(run.asOf, audience, part), {
    schema: 1,
    asOf: run.asOf,
    audience,
    tables: [...run.tables, ...run.failed].map((one) => one.table).sort(),
    hasNews: hasNews(run),
    message: compose[audience](run, voice),
  });
}
