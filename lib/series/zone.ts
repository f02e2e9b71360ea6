const formats = new Map<string, Intl.DateTimeFormat>();

/** A format that spells an instant as a local clock shows it. @throws RangeError for an unknown zone */
function clockOf(timeZone: string): Intl.DateTimeFormat {
  let format = formats.get(timeZone);
  if (!format) {
    format = new Intl.DateTimeFormat("en-US", {
      timeZone,
      calendar: "iso8601",
      hourCycle: "h23",
      era: "short",
      year: "numeric",
      month: "numeric",
      day: "numeric",
      hour: "numeric",
      minute: "numeric",
      second: "numeric",
    });
    formats.set(timeZone, format);
  }
  return format;
}

/**
 * What a local clock is ahead of UTC at an instant, in milliseconds, by the IANA time-zone database that the
 * runtime carries.
 *
 * @example zoneOffset(Date.parse("2026-07-01T00:00:00Z"), "Europe/Lisbon") // 3600000
 * @throws RangeError for an unknown zone
 */
export function zoneOffset(instant: number, timeZone: string): number {
  if (timeZone === "UTC") return 0;
  const part: Record<string, string> = {};
  for (const { type, value } of clockOf(timeZone).formatToParts(instant)) part[type] = value;
  const year = part.era?.startsWith("B") ? 1 - Number(part.year) : Number(part.year);
  const local = new Date(0);
  local.setUTCFullYear(year, Number(part.month) - 1, Number(part.day));
  local.setUTCHours(Number(part.hour), Number(part.minute), Number(part.second));
  return local.getTime() - Math.floor(instant / 1000) * 1000;
}

const halfDay = 43_200_000;

/**
 * The instants a local clock reading may stand for, earlier first: one on most days, two in the hour that a clock
 * repeats in autumn, none in the hour it skips in spring. `local` is the reading taken as if it were UTC.
 */
export function instantsOf(local: number, timeZone: string): number[] {
  const before = local - zoneOffset(local - halfDay, timeZone);
  const after = local - zoneOffset(local + halfDay, timeZone);
  const candidates = before === after ? [before] : before < after ? [before, after] : [after, before];
  return candidates.filter((instant) => instant + zoneOffset(instant, timeZone) === local);
}
