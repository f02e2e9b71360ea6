import type { ObjectStore } from "../store/objectStore.ts";
import type { Message } from "../webhook/message.ts";
import type { SeriesFacts } from "../words/facts.ts";
import { type Audience, readMessageParts } from "./messages.ts";
import { readNewestModel } from "./modelDocument.ts";

/** What a run said to one audience: the first part, which is usually the whole. */
export async function readMessage(
  store: ObjectStore,
  asOf: string,
  audience: Audience,
): Promise<Message | undefined> {
  return (await readMessageParts(store, asOf, audience))[0]?.message;
}

/** The newest facts of a table's series at or before an instant; `undefined` when the table was never refitted. */
export async function readFacts(
  store: ObjectStore,
  table: string,
  asOf: string,
): Promise<{ asOf: string; series: readonly SeriesFacts[] } | undefined> {
  const model = await readNewestModel(store, table, asOf);
  return model && { asOf: model.asOf, series: model.series.map((one) => one.facts) };
}
