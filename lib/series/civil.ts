/** Days since 1970-01-01 of a date of the proleptic Gregorian calendar; `month` is 1 to 12. */
export function dayNumber(year: number, month: number, day: number): number {
  // Shifted so that a year begins in March: the leap day is its last day (Howard Hinnant, "chrono-compatible
  // low-level date algorithms", 2013).
  const shifted = month > 2 ? year : year - 1;
  const era = Math.floor(shifted / 400);
  const yearOfEra = shifted - era * 400;
  const dayOfYear = Math.floor((153 * (month > 2 ? month - 3 : month + 9) + 2) / 5) + day - 1;
  const dayOfEra = yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear;
  return era * 146097 + dayOfEra - 719468;
}

export interface CivilDate {
  readonly year: number;
  readonly month: number;
  readonly day: number;
}

/** The date that lies `days` days after 1970-01-01. */
export function civilDate(days: number): CivilDate {
  const shifted = days + 719468;
  const era = Math.floor(shifted / 146097);
  const dayOfEra = shifted - era * 146097;
  const yearOfEra = Math.floor(
    (dayOfEra - Math.floor(dayOfEra / 1460) + Math.floor(dayOfEra / 36524) - Math.floor(dayOfEra / 146096)) /
      365,
  );
  const dayOfYear = dayOfEra - (365 * yearOfEra + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100));
  const monthFromMarch = Math.floor((5 * dayOfYear + 2) / 153);
  const month = monthFromMarch < 10 ? monthFromMarch + 3 : monthFromMarch - 9;
  return {
    year: yearOfEra + era * 400 + (month <= 2 ? 1 : 0),
    month,
    day: dayOfYear - Math.floor((153 * monthFromMarch + 2) / 5) + 1,
  };
}

/** Days in a month, 1 to 12. */
export function daysInMonth(year: number, month: number): number {
  if (month === 2) return year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0) ? 29 : 28;
  return month === 4 || month === 6 || month === 9 || month === 11 ? 30 : 31;
}

/** The date exists: 2023-02-29 does not. */
export function isCivilDate(year: number, month: number, day: number): boolean {
  return month >= 1 && month <= 12 && day >= 1 && day <= daysInMonth(year, month);
}

const twoDigits = (value: number) => (value < 10 ? `0${value}` : String(value));

/** A day number as an ISO date. @example isoDate(0) // "1970-01-01" */
export function isoDate(days: number): string {
  const { year, month, day } = civilDate(days);
  return `${String(year).padStart(4, "0")}-${twoDigits(month)}-${twoDigits(day)}`;
}

/** The day number of an ISO date, or of the date part of an ISO instant. @throws RangeError for any other text */
export function isoDay(text: string): number {
  const match = /^(\d{4})-(\d{2})-(\d{2})(?:$|T)/.exec(text);
  const [year, month, day] = match ? match.slice(1).map(Number) : [0, 0, 0];
  if (!match || !isCivilDate(year, month, day))
    throw new RangeError(`isoDay: ${JSON.stringify(text)} is not an ISO date`);
  return dayNumber(year, month, day);
}

/** 0 for Monday to 6 for Sunday. 1970-01-01 was a Thursday. */
export const weekday = (days: number) => (((days + 3) % 7) + 7) % 7;

/**
 * The Monday of an ISO 8601 week, as a day number: week 1 is the one that holds 4 January.
 * `undefined` for a week 53 that the year does not have.
 */
export function isoWeekStart(year: number, week: number): number | undefined {
  const firstMonday = (of: number) => {
    const fourth = dayNumber(of, 1, 4);
    return fourth - weekday(fourth);
  };
  const start = firstMonday(year) + 7 * (week - 1);
  return week >= 1 && start < firstMonday(year + 1) ? start : undefined;
}
