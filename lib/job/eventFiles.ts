import type { Problem } from "../series/series.ts";
import type { ObjectStore } from "../store/objectStore.ts";
import { settingsKey } from "./keys.ts";

/** The files of known events in a store, one after another. */
export async function* eventFiles(
  store: ObjectStore,
): AsyncGenerator<{ readonly key: string; readonly bytes: Uint8Array }> {
  for (const { key } of await store.list("events/")) {
    const found = key.endsWith(".csv") ? await store.read(key) : undefined;
    if (found) yield { key, bytes: found.bytes };
  }
}

/** What is wrong with a country whose holidays are not known. @throws what else went wrong, as it came */
export function noHolidays(error: unknown, fatal: boolean): Problem {
  if (!(error instanceof RangeError)) throw error;
  const remedy = "use an ISO 3166 code such as PT or DE-BY, or take country out of the settings";
  return { table: settingsKey, code: "no-holidays", message: error.message, remedy, fatal };
}
