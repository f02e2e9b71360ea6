// Making a formatter of Intl costs a thousand times more than using one, and a run asks for the same few again and
// again. They are pure functions of their options, so keeping them changes nothing that can be seen.
const dates = new Map<string, Intl.DateTimeFormat>();
const numbers = new Map<string, Intl.NumberFormat>();

export function dateFormat(locale: string, options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  return kept(dates, locale, options, () => new Intl.DateTimeFormat(locale, options));
}

export function numberFormat(locale: string, options: Intl.NumberFormatOptions): Intl.NumberFormat {
  return kept(numbers, locale, options, () => new Intl.NumberFormat(locale, options));
}

function kept<T>(formats: Map<string, T>, locale: string, options: object, make: () => T): T {
  const key = locale + JSON.stringify(options);
  const known = formats.get(key);
  if (known) return known;
  const made = make();
  formats.set(key, made);
  return made;
}
