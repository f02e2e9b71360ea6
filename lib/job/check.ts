import { nearestName } from "../series/nearestName.ts";
import { periodStart } from "../series/periods.ts";
import { periodsLate } from "../series/periodsLate.ts";
import type { Reading } from "../series/reading.ts";
import { readTableStream } from "../series/readTableStream.ts";
import type { Period, Problem, Series } from "../series/series.ts";
import type { ObjectStore } from "../store/objectStore.ts";
import { type CheckedEvents, checkEvents } from "./checkEvents.ts";
import { closedDays } from "./closedDays.ts";
import { decodeText } from "./documents.ts";
import { asOfText, seriesPrefix, settingsKey, tableEndings, tableNameFault, tableOfKey } from "./keys.ts";
import { parseSettings, type Settings } from "./settings.ts";

/** One series as it would be forecast. */
export interface CheckedSeries {
  readonly name: string;
  readonly period: Period;
  readonly start: string;
  readonly lastPeriod: string;
  readonly observed: number;
  readonly gaps: number;
  /** Start of the newest gap, if any. */
  readonly latestGap: string | null;
  /** Weekdays (0 Sunday .. 6 Saturday) that every gap falls on, where that looks like closed days. */
  readonly closedDays: readonly number[];
  /** Periods that are over and have no value yet. */
  readonly periodsLate: number;
}

export interface CheckedTable {
  readonly table: string;
  readonly readable: boolean;
  readonly series: readonly CheckedSeries[];
  readonly reading: Reading | null;
  readonly problems: readonly Problem[];
}

/** What `check` found: plain data, from which `describeCheck` speaks. */
export interface CheckReport {
  readonly asOf: string;
  readonly address: string;
  readonly locale: string;
  readonly timeZone: string;
  readonly tables: readonly CheckedTable[];
  readonly settings: { readonly found: boolean; readonly problems: readonly Problem[] };
  readonly events: readonly CheckedEvents[];
  /** Files under `series/` of a kind that is not read. */
  readonly otherFiles: readonly string[];
  /** Tables that cannot be read, plus one if the settings cannot be used. */
  readonly failed: number;
}

export interface CheckOptions {
  readonly store: ObjectStore;
  readonly asOf: Date | string;
  /** Instead of the store's `settings.json`. */
  readonly settings?: Settings;
}

function checkedSeries(series: Series, asOf: string, timeZone: string): CheckedSeries {
  const { name, period, start, values, observed, gaps } = series;
  const lastPeriod = periodStart(start, period, values.length - 1);
  const gap = values.findLastIndex((value) => Number.isNaN(value));
  return {
    name,
    period,
    start,
    lastPeriod,
    observed,
    gaps,
    latestGap: gap < 0 ? null : periodStart(start, period, gap),
    closedDays: closedDays(series),
    periodsLate: periodsLate(lastPeriod, period, asOf, timeZone),
  };
}

/** Reads a table as it comes from the store, so that `check` can look at tables of any size, and at any kind. */
async function checkTable(
  store: ObjectStore,
  keys: readonly string[],
  settings: Settings,
  asOf: string,
): Promise<CheckedTable> {
  const key = tableEndings.flatMap((ending) => keys.filter((one) => one.endsWith(ending)))[0];
  const table = tableOfKey(key) ?? key;
  const tableSettings = settings.tables[table] ?? {};
  const { timeZone, locale } = settings;
  const context = { asOf, timeZone, locale, table };
  const { series, problems, reading } = await readTableStream(
    (await store.stream(key)) ?? [],
    tableSettings,
    context,
  );
  const others = keys.filter((one) => one !== key);
  if (others.length > 0)
    problems.push({
      table,
      code: "same-name",
      message: `${others.join(" and ")} would be the same table as ${key}, and is not read`,
      remedy: "rename one of them",
      fatal: false,
    });
  const zone = tableSettings.timeZone ?? timeZone;
  return {
    table,
    readable: series.length > 0 && !problems.some((problem) => problem.fatal),
    series: series.map((one) => checkedSeries(one, asOf, zone)),
    reading,
    problems,
  };
}

/** Settings for tables that are not there are most often mistyped names. */
function strangers(settings: Settings, tables: readonly string[]): Problem[] {
  return Object.keys(settings.tables)
    .filter((name) => !tables.includes(name))
    .map((name) => {
      const near = nearestName(name, tables);
      return {
        table: settingsKey,
        code: "no-such-table",
        message: `there is no table "${name}" under series/`,
        remedy: near ? `did you mean "${near}"?` : "take it out of the settings, or add the table",
        fatal: false,
      };
    });
}

/**
 * Reads settings, tables and events as a run would, writes nothing, and tells what it saw.
 *
 * @throws StoreError when the store cannot be listed or read
 */
export async function checkStore(options: CheckOptions): Promise<CheckReport> {
  const { store } = options;
  const asOf = asOfText(options.asOf);
  const stored = options.settings ? undefined : await store.read(settingsKey);
  const parsed = parseSettings(stored && decodeText(stored.bytes));
  const settings = options.settings ?? parsed.settings;
  const keys = (await store.list(seriesPrefix)).map(({ key }) => key);
  const tables: CheckedTable[] = [];
  const names = [...new Set(keys.map(tableOfKey).filter((table) => table !== undefined))].sort();
  for (const table of names) {
    const fault = tableNameFault(table);
    if (fault) {
      const message = `the name of the table ${fault}`;
      const problem = {
        table,
        code: "table-name",
        message,
        remedy: "rename the file under series/",
        fatal: true,
      };
      tables.push({ table, readable: false, series: [], reading: null, problems: [problem] });
    } else {
      const own = keys.filter((key) => tableOfKey(key) === table);
      tables.push(await checkTable(store, own, settings, asOf));
    }
  }
  const events = await checkEvents(store, settings, asOf);
  const settingsProblems = [
    ...parsed.problems,
    ...(parsed.problems.length > 0 ? [] : strangers(settings, names)),
  ];
  return {
    asOf,
    address: store.address,
    locale: settings.locale,
    timeZone: settings.timeZone,
    tables,
    settings: { found: stored !== undefined, problems: settingsProblems },
    events,
    otherFiles: keys.filter((key) => tableOfKey(key) === undefined),
    failed:
      tables.filter((table) => !table.readable).length +
      (settingsProblems.some((problem) => problem.fatal) ? 1 : 0),
  };
}
