import type { WatchResult } from "../drift/watchSeries.ts";
import type { Forecast } from "../forecast/forecast.ts";
import type { KnownEvent } from "../series/readEvents.ts";
import type { TableSettings } from "../series/tableSettings.ts";
import type { Finding, SeriesFacts } from "../words/facts.ts";
import type { EventAdjustment } from "./eventEffects.ts";
import type { StoredSeries } from "./modelDocument.ts";
import type { Settings } from "./settings.ts";
import type { SimulatedFading } from "./simulateFading.ts";
import type { TrackState } from "./trackRecord.ts";

/** What is known besides the values when a series is refitted. */
export interface SeriesTask {
  readonly asOf: string;
  readonly table: string;
  readonly settings: Settings;
  readonly tableSettings: TableSettings;
  readonly events: readonly KnownEvent[];
  /** The same series after the last run, and when that was. */
  readonly previous: { readonly asOf: string; readonly stored: StoredSeries } | undefined;
  /** Findings about the data themselves: revisions, lateness, an unfinished period. */
  readonly dataFindings: readonly Finding[];
}

/** Names of the places of a series, and the places of names. */
export interface Calendar {
  readonly periodOf: (index: number) => string;
  readonly indexOf: (period: string) => number;
}

/** What refitting a series came to, before it is put into facts. */
export interface Refit {
  readonly adjusted: EventAdjustment;
  readonly watched: WatchResult;
  readonly firstIndex: number;
  readonly forecast: Forecast;
  readonly forecasts: SeriesFacts["forecast"];
  readonly track: TrackState;
  readonly calendar: Calendar;
  /** Departures of the values from the model's terms. */
  readonly departing: Float64Array;
  readonly simulated: SimulatedFading;
}
