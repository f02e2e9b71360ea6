import { publicHolidays } from "../series/publicHolidays.ts";
import { readEvents } from "../series/readEvents.ts";
import type { Problem } from "../series/series.ts";
import type { ObjectStore } from "../store/objectStore.ts";
import { eventFiles, noHolidays } from "./eventFiles.ts";
import type { Settings } from "./settings.ts";

/** One file of events, or the public holidays, as a run would know them. */
export interface CheckedEvents {
  readonly file: string;
  readonly events: number;
  readonly problems: readonly Problem[];
}

/** The events a run would know, file by file, and the public holidays of this year where a country is set. */
export async function checkEvents(
  store: ObjectStore,
  { locale, country }: Settings,
  asOf: string,
): Promise<CheckedEvents[]> {
  const checked: CheckedEvents[] = [];
  for await (const { key, bytes } of eventFiles(store)) {
    const { events, problems } = readEvents(bytes, key, locale);
    checked.push({ file: key, events: events.length, problems });
  }
  if (country === undefined) return checked;
  const file = `public holidays of ${country} in ${asOf.slice(0, 4)}`;
  const year = Number(asOf.slice(0, 4));
  try {
    checked.push({ file, events: (await publicHolidays(country, year, year)).length, problems: [] });
  } catch (error) {
    checked.push({ file, events: 0, problems: [noHolidays(error, false)] });
  }
  return checked;
}
