import type { ObjectStore } from "../store/objectStore.ts";
import { createDocument, readDocument } from "./documents.ts";
import { asOfText, planKey, seriesPrefix, tableNameFault, tableOfKey } from "./keys.ts";
import { loadEvents } from "./loadEvents.ts";
import { NoTablesError } from "./noTables.ts";
import { toldRunBefore } from "./runHistory.ts";
import { defaultSettings, type Settings } from "./settings.ts";
import type { FailedTable, Plan } from "./summary.ts";

/** Tables a worker takes at a time; small enough that a retried portion costs little. */
const tablesPerPortion = 25;

function refusal(table: string, key: string, fault: string): FailedTable {
  const problem = {
    table,
    code: "table-name",
    message: `the name of "${key}" ${fault}`,
    remedy: "rename the file under series/",
    fatal: true,
  };
  return { table, hasForecast: false, problems: [problem] };
}

/**
 * Tables of the last run that are there no more. This plan does not list them, so the run after it will not miss them:
 * they are told once. What only a replay told, nobody was told, and is carried on.
 */
async function goneTables(store: ObjectStore, asOf: string, tables: ReadonlySet<string>): Promise<string[]> {
  const told = await toldRunBefore(store, asOf);
  const before = told === undefined ? undefined : await readDocument<Plan>(store, planKey(told));
  if (before === undefined) return [];
  const known = [...before.tables, ...(before.replayed ? (before.gone ?? []) : [])];
  return known.filter((table) => !tables.has(table)).sort();
}

/**
 * Lists the tables under `series/` and writes what the run sets out to do, once: a retry gets the first plan back,
 * even if files came or went meanwhile.
 *
 * @throws StoreError when the store cannot be listed or written, NoTablesError when there is nothing to do or to tell
 */
export async function planRun(options: {
  readonly store: ObjectStore;
  readonly asOf: Date | string;
  readonly settings?: Pick<Settings, "locale" | "country">;
  /** The run is of a replay: what it says is posted to nobody. */
  readonly replayed?: boolean;
}): Promise<Plan> {
  const { store } = options;
  const asOf = asOfText(options.asOf);
  const standing = await readDocument<Plan>(store, planKey(asOf));
  if (standing) return standing;
  const tables = new Set<string>();
  const { refused } = await loadEvents(store, options.settings ?? defaultSettings, asOf);
  for (const { key } of await store.list(seriesPrefix)) {
    const table = tableOfKey(key);
    if (table === undefined) continue;
    const fault = tableNameFault(table);
    if (fault) refused.push(refusal(table, key, fault));
    else tables.add(table);
  }
  const ordered = [...tables].sort();
  const portions = [];
  for (let from = 0; from < ordered.length; from += tablesPerPortion)
    portions.push(ordered.slice(from, from + tablesPerPortion));
  const gone = await goneTables(store, asOf, tables);
  if (ordered.length + gone.length === 0 && refused.every((one) => one.beside))
    throw new NoTablesError(store.address);
  return createDocument<Plan>(store, planKey(asOf), {
    schema: 1,
    asOf,
    tables: ordered,
    portions,
    refused,
    ...(gone.length > 0 ? { gone } : {}),
    ...(options.replayed ? { replayed: true } : {}),
  });
}
