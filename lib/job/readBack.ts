import { nearestName } from "../series/nearestName.ts";
import type { ObjectStore } from "../store/objectStore.ts";
import type { Message } from "../webhook/message.ts";
import type { SeriesFacts } from "../words/facts.ts";
import { seriesPrefix, tableNameFault, tableOfKey } from "./keys.ts";
import { type Audience, readMessageParts } from "./messages.ts";
import { firstModel, readNewestModel } from "./modelDocument.ts";
import { noTablesText } from "./noTables.ts";

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
  if (tableNameFault(table) !== undefined) return undefined;
  const model = await readNewestModel(store, table, asOf);
  return model && { asOf: model.asOf, series: model.series.map((one) => one.facts) };
}

/** Tables beyond this many are not listed to someone who misspelt one. */
const mostListed = 12;

/** Why `readFacts` found nothing, and what to do: the table does not exist, its models are younger, or it was never refitted. */
export async function whyNoFacts(store: ObjectStore, table: string, asOf: string): Promise<string> {
  const first = tableNameFault(table) === undefined ? await firstModel(store, table) : undefined;
  if (first !== undefined)
    return `the first model of table "${table}" is of ${first}: there is none yet at ${asOf}`;
  const keys = (await store.list(seriesPrefix)).map(({ key }) => tableOfKey(key));
  const tables = [...new Set(keys.filter((one) => one !== undefined))];
  if (tables.includes(table)) return `no model of table "${table}" stands in ${store.address} yet: run first`;
  if (tables.length === 0) return noTablesText(store.address);
  const near = nearestName(table, tables);
  const remedy = near
    ? `did you mean "${near}"?`
    : tables.length <= mostListed
      ? `it has ${tables.join(", ")}`
      : `check lists its ${tables.length} tables`;
  return `there is no table "${table}" in ${store.address}: ${remedy}`;
}
