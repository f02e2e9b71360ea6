import { type KnownEvent, readEvents } from "../series/readEvents.ts";
import type { ObjectStore } from "../store/objectStore.ts";
import type { FailedTable } from "./summary.ts";

const eventsPrefix = "events/";

/**
 * The known events of a store, `events/<name>.csv`, and the files that cannot be used. A row with a bad date is left
 * out (`check` names it).
 */
export async function loadEvents(
  store: ObjectStore,
  locale: string,
): Promise<{ events: KnownEvent[]; refused: FailedTable[] }> {
  const events: KnownEvent[] = [];
  const refused: FailedTable[] = [];
  for (const { key } of await store.list(eventsPrefix)) {
    if (!key.endsWith(".csv")) continue;
    const found = await store.read(key);
    if (!found) continue;
    const name = key.slice(0, -".csv".length);
    const read = readEvents(found.bytes, name, locale);
    events.push(...read.events);
    const fatal = read.problems.filter((problem) => problem.fatal);
    if (fatal.length > 0) refused.push({ table: name, problems: fatal });
  }
  return { events, refused };
}
