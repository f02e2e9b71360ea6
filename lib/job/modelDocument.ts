import type { Problem } from "../series/series.ts";
import type { ObjectStore } from "../store/objectStore.ts";
import type { SeriesFacts } from "../words/facts.ts";
import { readDocument, type Versioned } from "./documents.ts";
import { asOfFromKey, modelKey, modelPrefix } from "./keys.ts";
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

/** `models/<table>/<asOf>.json`: immutable, one a table a run. */
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

/** What stands under `models/<table>/` around one instant. */
export interface ModelShelf {
  readonly current: boolean;
  readonly previousAsOf: string | undefined;
  /** The newest one of all, if it is later than the instant. */
  readonly later: string | undefined;
}

/** Lists the models of one table (never those of tables nested below it). */
export async function readModelShelf(store: ObjectStore, table: string, asOf: string): Promise<ModelShelf> {
  const prefix = modelPrefix(table);
  const instants = (await store.list(prefix))
    .map(({ key }) => key.slice(prefix.length))
    .filter((rest) => rest.endsWith(".json") && !rest.includes("/"))
    .map((rest) => asOfFromKey(rest.slice(0, -".json".length)))
    .filter((instant) => instant !== undefined);
  return {
    current: instants.includes(asOf),
    previousAsOf: instants.filter((instant) => instant < asOf).at(-1),
    later: instants.filter((instant) => instant > asOf).at(-1),
  };
}

export const readModel = (store: ObjectStore, table: string, asOf: string) =>
  readDocument<ModelDocument>(store, modelKey(table, asOf));

/** The newest model of a table at or before an instant. */
export async function readNewestModel(
  store: ObjectStore,
  table: string,
  asOf: string,
): Promise<ModelDocument | undefined> {
  const shelf = await readModelShelf(store, table, asOf);
  const instant = shelf.current ? asOf : shelf.previousAsOf;
  return instant === undefined ? undefined : readModel(store, table, instant);
}
