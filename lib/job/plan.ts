import type { ObjectStore } from "../store/objectStore.ts";
import { createDocument } from "./documents.ts";
import { asOfText, planKey, seriesPrefix, tableNameFault, tableOfKey } from "./keys.ts";
import { loadEvents } from "./loadEvents.ts";
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
  return { table, problems: [problem] };
}

/**
 * Lists the tables under `series/` and writes what the run sets out to do, once: a retry gets the first plan back,
 * even if files came or went meanwhile.
 *
 * @throws StoreError when the store cannot be listed or written
 */
export async function planRun(options: {
  readonly store: ObjectStore;
  readonly asOf: Date | string;
  readonly settings?: Pick<Settings, "locale" | "country">;
}): Promise<Plan> {
  const { store } = options;
  const asOf = asOfText(options.asOf);
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
  return createDocument<Plan>(store, planKey(asOf), { schema: 1, asOf, tables: ordered, portions, refused });
}
