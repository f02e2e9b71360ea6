import type { KnownEvent } from "./readEvents.ts";

/**
 * Public holidays of a country (`PT`) or region (`DE-BY`) as known events, from the package date-holidays
 * (ISC; its data CC BY 3.0, after Wikipedia and national laws), which is loaded only now: it is large. Each holiday is
 * named as the country names it, the same in every year, so that all its years teach one effect.
 *
 * @throws RangeError for a country or region the package does not know
 */
export async function publicHolidays(
  country: string,
  fromYear: number,
  untilYear: number,
): Promise<KnownEvent[]> {
  const { default: Holidays } = await import("date-holidays");
  const [code, region] = country.split("-");
  const known = new Holidays();
  const regions = known.getStates(code) as Record<string, string> | undefined;
  const isKnown = code in (known.getCountries() as Record<string, string>);
  if (!isKnown || (region !== undefined && !(region in (regions ?? {}))))
    throw new RangeError(`no public holidays are known for ${JSON.stringify(country)}`);
  const calendar = region === undefined ? new Holidays(code) : new Holidays(code, region);
  const events: KnownEvent[] = [];
  for (let year = fromYear; year <= untilYear; year++) {
    for (const { date, name, type } of calendar.getHolidays(year)) {
      if (type !== "public") continue;
      const day = date.slice(0, 10);
      events.push({ name, from: day, until: day, tables: null });
    }
  }
  return events;
}
