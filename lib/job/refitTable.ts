import type { KnownEvent } from "../series/readEvents.ts";
import type { Reading } from "../series/reading.ts";
import { readTableStream } from "../series/readTableStream.ts";
import type { Problem, Series } from "../series/series.ts";
import { type ObjectStore, StoreError } from "../store/objectStore.ts";
import { carryOver } from "./carryOver.ts";
import { dataFindings } from "./dataFindings.ts";
import type { ProblemsDocument } from "./digest.ts";
import { createDocument, encodeText } from "./documents.ts";
import { tellDiscoveries } from "./falseDiscoveries.ts";
import { forecastCsv } from "./forecastCsv.ts";
import { forecastKey, latestForecastKey, problemsKey } from "./keys.ts";
import {
  createModel,
  type ModelDocument,
  type ModelShelf,
  readModelShelf,
  readStandingModel,
  type StoredSeries,
} from "./modelDocument.ts";
import { openSource } from "./openSource.ts";
import { refitSeries, sameCalendar } from "./refitSeries.ts";
import { seriesDigest } from "./seriesDigest.ts";
import type { SeriesTask } from "./seriesTask.ts";
import type { Settings } from "./settings.ts";

interface TableTask {
  readonly store: ObjectStore;
  readonly asOf: string;
  readonly table: string;
  readonly settings: Settings;
  readonly events: readonly KnownEvent[];
}

type TableOutcome =
  | { readonly status: "refitted" | "already"; readonly series: number }
  | { readonly status: "failed"; readonly problems: readonly Problem[] };

/**
 * Writes the forecasts of a model document: `latest.csv` first, `<asOf>.csv` last, so that the second standing
 * there proves the first was written. `latest.csv` belongs to the newest model: a replayed run of the past leaves it
 * alone, and when a later run ended while this one wrote, its forecasts are put back.
 */
async function writeForecasts(store: ObjectStore, model: ModelDocument, shelf: ModelShelf): Promise<void> {
  const { table, asOf } = model;
  const csv = csvOf(model);
  if (shelf.later === undefined) {
    await store.write(latestForecastKey(table), csv);
    const { later } = await readModelShelf(store, table, asOf);
    const newest = later && (await readStandingModel(store, later));
    if (newest) await store.write(latestForecastKey(table), csvOf(newest));
  }
  await store.create(forecastKey(table, asOf), csv);
}

const csvOf = (model: ModelDocument) => encodeText(forecastCsv(model.series.map((one) => one.facts)));

async function fail(task: TableTask, problems: readonly Problem[]): Promise<TableOutcome> {
  const { store, asOf, table } = task;
  const standing = await createDocument<ProblemsDocument>(store, problemsKey(asOf, table), {
    schema: 1,
    table,
    problems,
  });
  return { status: "failed", problems: standing.problems };
}

/** Refits a series, or carries its last account over when not one value changed. */
function refitOrCarry(
  series: Series,
  task: Omit<SeriesTask, "dataFindings">,
  reading: Reading | null,
): StoredSeries {
  const { settings, tableSettings, asOf } = task;
  const previous = task.previous && sameCalendar(series, task.previous.stored) ? task.previous : undefined;
  const findings = dataFindings(series, previous?.stored, {
    asOf,
    timeZone: tableSettings.timeZone ?? settings.timeZone,
    settings,
    tableSettings,
    reading,
  });
  if (previous && previous.stored.digest === seriesDigest(series, task))
    return carryOver(previous.stored, findings);
  return refitSeries(series, { ...task, previous, dataFindings: findings });
}

/** Series of the last run that the table no longer has: renamed or taken out, their watch and record end. */
function goneSeries(table: string, earlier: readonly string[], series: readonly Series[]): Problem[] {
  const present = new Set(series.map((one) => one.name));
  return earlier
    .filter((name) => !present.has(name))
    .map((name) => ({
      table,
      column: name,
      code: "series-gone",
      message: `the series ${JSON.stringify(name)} of the last run is not in the table any more`,
      remedy: "nothing, if that is meant; a renamed series begins anew under its new name",
      fatal: false,
    }));
}

async function refitFresh(task: TableTask, shelf: ModelShelf): Promise<TableOutcome> {
  const { store, asOf, table, settings, events } = task;
  const source = await openSource(store, table);
  if (!source) {
    const message = "the file was there when the run began and is gone";
    return fail(task, [{ table, code: "gone", message, remedy: "put it back", fatal: true }]);
  }
  const tableSettings = Object.hasOwn(settings.tables, table) ? settings.tables[table] : {};
  const { timeZone, locale } = settings;
  const { series, problems, reading } = await readTableStream(source.pieces, tableSettings, {
    asOf,
    timeZone,
    locale,
    table,
  });
  if (series.length === 0 || problems.some((problem) => problem.fatal)) return fail(task, problems);
  const previous = shelf.previous && (await readStandingModel(store, shelf.previous));
  const earlier = new Map(
    previous?.series.map((stored) => [stored.facts.series, { asOf: previous.asOf, stored }]),
  );
  const accounts = series.map((one) =>
    refitOrCarry(
      one,
      { asOf, table, settings, tableSettings, events, previous: earlier.get(one.name) },
      reading,
    ),
  );
  const { falseDiscoveryRate } = settings;
  const made: ModelDocument = {
    schema: 1,
    table,
    asOf,
    source: source.digest(),
    reading,
    problems: [...problems, ...goneSeries(table, [...earlier.keys()], series)],
    series: falseDiscoveryRate === undefined ? accounts : tellDiscoveries(accounts, falseDiscoveryRate),
  };
  const before = shelf.previous && { place: shelf.previous, series: previous?.series.length ?? 0 };
  const model = await createModel(store, made, before);
  await writeForecasts(store, model, shelf);
  return { status: "refitted", series: model.series.length };
}

/**
 * Reads, refits and forecasts one table, and writes its model and forecasts; found done, it only makes sure that
 * the forecasts stand too. What is wrong with the table is returned, never thrown; the earlier forecast then stays.
 *
 * @throws StoreError when the store itself fails: the run cannot go on then
 */
export async function refitTable(task: TableTask): Promise<TableOutcome> {
  const { store, asOf, table } = task;
  const shelf = await readModelShelf(store, table, asOf);
  try {
    if (!shelf.current) return await refitFresh(task, shelf);
    const model = await readStandingModel(store, shelf.current);
    if (!model) throw new Error(`the model of ${asOf} was listed and is gone`);
    await writeForecasts(store, model, shelf);
    return { status: "already", series: model.series.length };
  } catch (error) {
    if (error instanceof StoreError) throw error;
    const message = error instanceof Error ? error.message : String(error);
    const remedy =
      "look at the table's newest rows; if they are right, please report this with the table's name";
    return fail(task, [{ table, code: "not-fitted", message, remedy, fatal: true }]);
  }
}
