import { publicHolidays } from "../series/publicHolidays.ts";
import { type KnownEvent, readEvents } from "../series/readEvents.ts";
import type { ObjectStore } from "../store/objectStore.ts";
import { eventFiles, noHolidays } from "./eventFiles.ts";
import { settingsKey } from "./keys.ts";
import type { Settings } from "./settings.ts";
import type { FailedTable } from "./summary.ts";

/** Public holidays are taken from so many years before a run to so many after it. */
const yearsAround = { before: 30, after: 5 };

/** The last answer: a worker asks again for every portion of a run. */
let lastHolidays:
  | { readonly country: string; readonly year: number; readonly events: KnownEvent[] }
  | undefined;

async function holidaysAround(country: string, year: number): Promise<KnownEvent[]> {
  if (lastHolidays?.country !== country || lastHolidays.year !== year) {
    const events = await publicHolidays(country, year - yearsAround.before, year + yearsAround.after);
    lastHolidays = { country, year, events };
  }
  return lastHolidays.events;
}

/**
 * The known events of a store, `events/<name>.csv`, and the files that cannot be used. A row with a bad date is left
 * out (`check` names it). With a country set its public holidays are among the events.
 */
export async function loadEvents(
  store: ObjectStore,
  { locale, country }: Pick<Settings, "locale" | "country">,
  asOf: string,
): Promise<{ events: KnownEvent[]; refused: FailedTable[] }> {
  const events: KnownEvent[] = [];
  const refused: FailedTable[] = [];
  for await (const { key, bytes } of eventFiles(store)) {
    const name = key.slice(0, -".csv".length);
    const read = readEvents(bytes, name, locale);
    events.push(...read.events);
    const fatal = read.problems.filter((problem) => problem.fatal);
    if (fatal.length > 0) refused.push({ table: name, beside: true, problems: fatal });
  }
  if (country === undefined) return { events, refused };
  const year = Number(asOf.slice(0, 4));
  try {
    events.push(...(await holidaysAround(country, year)));
  } catch (error) {
    refused.push({ table: settingsKey, beside: true, problems: [noHolidays(error, true)] });
  }
  return { events, refused };
}
