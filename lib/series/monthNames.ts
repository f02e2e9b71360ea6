const plain = (word: string) =>
  word
    .normalize("NFD")
    .replace(/[\u0300-\u036f.]/g, "")
    .toLowerCase();

// Abbreviations in common use that CLDR does not give for these languages.
const extras: Record<string, Record<string, number>> = {
  en: { sept: 9 },
  de: { mrz: 3, marz: 3 },
  pt: { fev: 2 },
};

export interface MonthNames {
  /** 1 to 12, or 0 for a word that is no month. */
  monthOf(word: string): number;
  isWeekday(word: string): boolean;
}

/**
 * Names of months and weekdays as a locale writes them (CLDR, through Intl), long and short, with English as well.
 * Case, accents and points do not matter; a clear beginning of three letters or more will do.
 */
export function monthNames(locale: string): MonthNames {
  let names = made.get(locale);
  if (!names) {
    names = makeNames(locale);
    made.set(locale, names);
  }
  return names;
}

/** Making the names takes longer than reading a small table. */
const made = new Map<string, MonthNames>();

function makeNames(locale: string): MonthNames {
  const months = new Map<string, number>();
  const weekdayNames = new Set<string>();
  for (const language of [locale, "en"]) {
    for (const style of ["long", "short"] as const) {
      for (const options of [{ month: style }, { month: style, day: "numeric" }] as const) {
        const format = new Intl.DateTimeFormat(language, {
          ...options,
          timeZone: "UTC",
          calendar: "gregory",
        });
        for (let month = 0; month < 12; month++) {
          const part = format.formatToParts(Date.UTC(2024, month, 15)).find(({ type }) => type === "month");
          const name = plain(part?.value ?? "");
          if (/\p{L}/u.test(name) && !months.has(name)) months.set(name, month + 1);
        }
      }
      const weekday = new Intl.DateTimeFormat(language, { weekday: style, timeZone: "UTC" });
      for (let day = 1; day <= 7; day++) weekdayNames.add(plain(weekday.format(Date.UTC(2024, 0, day))));
    }
    for (const [word, month] of Object.entries(extras[language.slice(0, 2)] ?? {})) months.set(word, month);
  }
  const byBeginning = new Map<string, number>();
  const find = (word: string) => {
    const exact = months.get(word);
    if (exact !== undefined) return exact;
    if (word.length < 3) return 0;
    const found = new Set([...months].filter(([name]) => name.startsWith(word)).map(([, month]) => month));
    return found.size === 1 ? [...found][0] : 0;
  };
  return {
    monthOf(word) {
      const key = plain(word);
      let month = byBeginning.get(key);
      if (month === undefined) {
        month = find(key);
        if (byBeginning.size < 1000) byBeginning.set(key, month);
      }
      return month;
    },
    isWeekday: (word) => weekdayNames.has(plain(word)),
  };
}
