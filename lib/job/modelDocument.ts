import type { Problem } from "../series/series.ts";
import type { ObjectStore } from "../store/objectStore.ts";
import type { SeriesFacts } from "../words/facts.ts";
import { createDocument, readDocument, type Versioned } from "./documents.ts";
import { asOfFromKey, modelKey, modelPrefix, packedModelKey } from "./keys.ts";
import type { StandingChoice } from "./standingChoice.ts";
import type { TrackState } from "./trackRecord.ts";

/** One series after a run: what people are told, and what the next run goes on from. */
export interface StoredSeries {
  readonly facts: SeriesFacts;
  /** Names the values it was made from. */
  readonly digest: string;
  /** Start of the period from which the watch counts, and so the step and the first day of its periods. */
  readonly watchOrigin: string;
  /** State of the drift room; read back through its own schema. */
  readonly watch: unknown;
  readonly track: TrackState;
  /** What the forecast decided, to be gone by until it is due again; `null` where a simple rule forecasts. */
  readonly choice?: StandingChoice | null;
}

/** `models/<table>/<asOf>.json`, of many series `.json.gz`: immutable, one a table a run. */
export interface ModelDocument extends Versioned {
  readonly table: string;
  readonly asOf: string;
  /** SHA-256 of the table's bytes, so that an analyst can tell which file it was. */
  readonly source: string;
  /** What was taken for what when the table was read. */
  readonly reading: unknown;
  readonly problems: readonly Problem[];
  readonly series: readonly StoredSeries[];
}

/** A model that stands, by its instant and its key. */
interface Standing {
  readonly asOf: string;
  readonly key: string;
}

/** What stands under `models/<table>/` around one instant. */
export interface ModelShelf {
  readonly current: Standing | undefined;
  readonly previous: Standing | undefined;
  /** The newest one of all, if it is later than the instant. */
  readonly later: Standing | undefined;
}

/** Series from which on a table's models are compressed, to a third: so many are read by programs, not by people. */
const packedFrom = 50;

/** Whether a table of so many series has its models compressed. */
export const isPacked = (series: number): boolean => series >= packedFrom;

/** Where a model of so many series is written. */
const keyFor = ({ table, asOf, series }: ModelDocument) =>
  isPacked(series.length) ? packedModelKey(table, asOf) : modelKey(table, asOf);

/** Lists the models of one table (never those of tables nested below it). */
export async function readModelShelf(store: ObjectStore, table: string, asOf: string): Promise<ModelShelf> {
  const prefix = modelPrefix(table);
  const standing = (await store.list(prefix)).flatMap(({ key }): Standing[] => {
    const [, part] = /^([^/]+)\.json(?:\.gz)?$/.exec(key.slice(prefix.length)) ?? [];
    const instant = part === undefined ? undefined : asOfFromKey(part);
    return instant === undefined ? [] : [{ asOf: instant, key }];
  });
  return {
    current: standing.find((one) => one.asOf === asOf),
    previous: standing.filter((one) => one.asOf < asOf).at(-1),
    later: standing.filter((one) => one.asOf > asOf).at(-1),
  };
}

/** Writes a model once; the one that stands is returned. */
export const createModel = (store: ObjectStore, model: ModelDocument) =>
  createDocument(store, keyFor(model), model);

/** The model on a shelf's place. */
export const readStandingModel = (store: ObjectStore, { key }: Standing) =>
  readDocument<ModelDocument>(store, key);

/** The model of a table at an instant, whichever way it was written; `packed` tells which way to try first. */
export async function readModel(
  store: ObjectStore,
  table: string,
  asOf: string,
  packed: boolean,
): Promise<ModelDocument | undefined> {
  const keys = [modelKey(table, asOf), packedModelKey(table, asOf)];
  for (const key of packed ? keys.reverse() : keys) {
    const model = await readDocument<ModelDocument>(store, key);
    if (model) return model;
  }
  return undefined;
}

/** The newest model of a table at or before an instant. */
export async function readNewestModel(
  store: ObjectStore,
  table: string,
  asOf: string,
): Promise<ModelDocument | undefined> {
  const shelf = await readModelShelf(store, table, asOf);
  const newest = shelf.current ?? shelf.previous;
  return newest && readStandingModel(store, newest);
}
