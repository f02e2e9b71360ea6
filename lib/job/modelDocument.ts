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

/** The models of one table (never those of tables nested below it), oldest first. */
async function listModels(store: ObjectStore, table: string): Promise<Standing[]> {
  const prefix = modelPrefix(table);
  return (await store.list(prefix)).flatMap(({ key }): Standing[] => {
    const [, part] = /^([^/]+)\.json(?:\.gz)?$/.exec(key.slice(prefix.length)) ?? [];
    const instant = part === undefined ? undefined : asOfFromKey(part);
    return instant === undefined ? [] : [{ asOf: instant, key }];
  });
}

/** Lists the models of one table around an instant. */
export async function readModelShelf(store: ObjectStore, table: string, asOf: string): Promise<ModelShelf> {
  const standing = await listModels(store, table);
  return {
    current: standing.find((one) => one.asOf === asOf),
    previous: standing.filter((one) => one.asOf < asOf).at(-1),
    later: standing.filter((one) => one.asOf > asOf).at(-1),
  };
}

/** Whether a table has a forecast of another run: each stands since the model it was written after. */
export async function hasForecast(store: ObjectStore, table: string, asOf: string): Promise<boolean> {
  const { previous, later } = await readModelShelf(store, table, asOf);
  return (previous ?? later) !== undefined;
}

/** Instant of a table's oldest model. */
export const firstModel = async (store: ObjectStore, table: string): Promise<string | undefined> =>
  (await listModels(store, table))[0]?.asOf;

const isPacked = ({ key }: Standing) => key.endsWith(".gz");

/**
 * Writes a model once; the one that stands is returned. Compressed once the model before it had many series: that one is
 * the same for every run of an instant, whatever it reads now, so that all write to one key.
 */
export function createModel(
  store: ObjectStore,
  model: ModelDocument,
  before: { readonly place: Standing; readonly series: number } | undefined,
): Promise<ModelDocument> {
  const packed = before !== undefined && (isPacked(before.place) || before.series >= packedFrom);
  const key = packed ? packedModelKey(model.table, model.asOf) : modelKey(model.table, model.asOf);
  return createDocument(store, key, model);
}

/** The model on a shelf's place. */
export const readStandingModel = (store: ObjectStore, { key }: Standing) =>
  readDocument<ModelDocument>(store, key);

/**
 * Reads the models of one instant, table by table, whichever way each was written. Tables of a store are much alike: the
 * next is looked for the way the last was found.
 */
export function modelReader(
  store: ObjectStore,
  asOf: string,
): (table: string) => Promise<ModelDocument | undefined> {
  let keyOf = [modelKey, packedModelKey];
  return async (table) => {
    for (const way of keyOf) {
      const model = await readDocument<ModelDocument>(store, way(table, asOf));
      if (!model) continue;
      if (way !== keyOf[0]) keyOf = [...keyOf].reverse();
      return model;
    }
    return undefined;
  };
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
