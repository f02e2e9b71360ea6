import type { ChangeKind } from "../drift/notice.ts";
import type { Period, Problem } from "../series/series.ts";
import type { Finding } from "./finding.ts";

export type { Finding } from "./finding.ts";

// Plain facts: everything here survives JSON, so each sentence and picture can be made again from
// the stored document. A period is named by the ISO date (or instant) it starts at. Gaps are `null`.

export interface Range {
  readonly level: number;
  readonly low: number;
  readonly high: number;
}

export interface ForecastFacts {
  /** Start of each coming period. */
  readonly periods: readonly string[];
  readonly point: readonly number[];
  readonly median: readonly number[];
  readonly intervals: readonly {
    readonly level: number;
    readonly low: readonly number[];
    readonly high: readonly number[];
  }[];
  readonly total: { readonly point: number; readonly intervals: readonly Range[] };
  readonly chances: readonly {
    readonly direction: "above" | "below";
    readonly limit: number;
    readonly each: readonly number[];
    readonly any: number;
  }[];
  readonly candidates: readonly { readonly name: string; readonly weight: number }[];
}

/** The describing model in numbers: see DescribingModel of the forecast room. */
export interface ModelFacts {
  readonly scale: "raw" | "log";
  readonly trend: boolean;
  readonly season: number;
  readonly weight: number;
  readonly order: number;
  readonly coefficients: readonly number[];
  readonly standardErrors: readonly number[];
  readonly persistence: number;
  /** Periods; `null` when shocks are permanent. */
  readonly halfLife: number | null;
  /** A 90 % range; an end is `null` when it is infinite. */
  readonly halfLifeRange: { readonly low: number | null; readonly high: number | null };
  /** On the scale of the data; with a trend, the trend line at the next period. */
  readonly longRunLevel: number;
  readonly longRunLevelStandardError: number | null;
  /** Standard deviation the series has around its long-run level; `null` when infinite. */
  readonly longRunStandardDeviation: number | null;
  /** Standard deviation of the innovations, on the model's scale. */
  readonly shockSize: number;
  /** The dominant complex pair, if any: length in periods, damping a period. */
  readonly rhythm: { readonly length: number; readonly damping: number } | null;
  /** ψ_0.. for the picture of how a shock fades. */
  readonly weights: readonly number[];
  readonly residualAutocorrelations: readonly number[];
  readonly ljungBox: {
    readonly statistic: number;
    readonly degreesOfFreedom: number;
    readonly pValue: number;
  } | null;
  readonly fading: "fades" | "permanent" | "cannot-tell";
  readonly observations: number;
}

/** Old against new, coefficient by coefficient; a missing old or new coefficient is `null`. */
export interface ComparisonFacts {
  /** asOf of the model compared with. */
  readonly since: string;
  readonly orderBefore: number;
  readonly orderAfter: number;
  readonly coefficients: readonly {
    readonly lag: number;
    readonly before: number | null;
    readonly after: number | null;
    readonly difference: number;
    /** `null` when it cannot be judged. */
    readonly standardError: number | null;
  }[];
  readonly persistence: { readonly before: number; readonly after: number };
  readonly halfLife: { readonly before: number | null; readonly after: number | null };
}

/** What earlier runs' forecasts were worth, once the value they spoke of had come. */
export interface TrackRecord {
  readonly forecasts: number;
  /** Nominal level of the range scored, in percent. */
  readonly level: number;
  readonly insideRange: number;
  readonly meanAbsoluteError: number;
  readonly naiveMeanAbsoluteError: number;
  /** By horizon step 1..h: how many were scored, and both errors. */
  readonly byHorizon: readonly {
    readonly step: number;
    readonly forecasts: number;
    readonly insideRange: number;
    readonly meanAbsoluteError: number;
    readonly naiveMeanAbsoluteError: number;
  }[];
}

/** How much of the coming forecast still comes from each past shock. */
export interface AttributionFacts {
  readonly longRunLevel: number;
  /** Most influential first, on the model's scale. */
  readonly shocks: readonly {
    readonly period: string;
    readonly shock: number;
    /** Effect on each coming period. */
    readonly effects: readonly number[];
  }[];
}

export interface MonitorFacts {
  /** Period of the first look of this reference. */
  readonly since: string;
  readonly looksUsed: number;
  readonly looks: number;
  readonly falseAlarmRate: number;
  /** Each kind's statistic by look against its boundary. */
  readonly paths: readonly {
    readonly kind: ChangeKind;
    readonly boundary: number;
    readonly statistics: readonly (number | null)[];
  }[];
  readonly state: "watching" | "relearning" | "waiting-for-data";
}

/** All that is known of one series after a run: the entry of the model document, and what words and report read. */
export interface SeriesFacts {
  readonly series: string;
  readonly unit: string | null;
  /**
   * False when adding periods up means nothing, as for members at the end of each month: rows of one period are then
   * averaged, or the last or the largest is kept. No total is told of such a series.
   */
  readonly adds?: boolean;
  readonly period: Period;
  /** The tail that pictures and sentences need, oldest first. */
  readonly history: { readonly start: string; readonly values: readonly (number | null)[] };
  readonly lastPeriod: string;
  readonly observed: number;
  readonly gaps: number;
  readonly forecast: ForecastFacts;
  readonly model: ModelFacts;
  readonly comparison: ComparisonFacts | null;
  readonly attribution: AttributionFacts | null;
  readonly monitor: MonitorFacts | null;
  readonly findings: readonly Finding[];
  readonly trackRecord: TrackRecord | null;
  /** Rolling-origin error against the naive forecast on this series' own past; `null` when not measurable. */
  readonly backTest: {
    readonly origins: number;
    readonly relativeError: number | null;
    readonly coverage80: number | null;
  };
}

export interface TableFacts {
  readonly table: string;
  readonly series: readonly SeriesFacts[];
  readonly problems: readonly Problem[];
}

/** A table of the run before that is there no more. */
export interface GoneTable {
  readonly table: string;
  /** Its last forecast stands as it was. */
  readonly hasForecast: boolean;
}

/** A whole run, as the digest and the report tell it. */
export interface RunFacts {
  /** ISO instant. */
  readonly asOf: string;
  readonly tables: readonly TableFacts[];
  /** Tables that could not be read or refitted this time. */
  readonly failed: readonly {
    readonly table: string;
    /** No table but a file beside them, such as known events. */
    readonly beside?: boolean;
    /** False when no earlier forecast of the table stands. */
    readonly hasForecast?: boolean;
    readonly problems: readonly Problem[];
  }[];
  /** Tables not reached before time ran out. */
  readonly left: readonly string[];
  /** Told by the first run that misses them, and no more. */
  readonly gone?: readonly GoneTable[];
  /** Series left out of `tables` where a run has very many: steady ones, ones with news, and how many are watched. */
  readonly untold?: { readonly steady: number; readonly news: number; readonly watched: number };
  /** Notices that chance alone would bring over a year of looks, on average, over all watched series. */
  readonly expectedFalseNotices: number;
  /** Earlier notes that could not be delivered and are now sent first. */
  readonly undelivered: readonly { readonly asOf: string; readonly webhook: string }[];
  /** Told to operations alone; never in a document that must be the same after a retry. */
  readonly durationMilliseconds?: number;
}

/** How to speak. */
export interface Voice {
  /** BCP 47, for example `en-GB`: governs numbers and dates; sentences are English. */
  readonly locale: string;
  /** IANA name. */
  readonly timeZone: string;
  /** Say little when nothing changed. */
  readonly quietWhenSteady: boolean;
  /** Base address of a page where reports can be opened, if the owner gave one. */
  readonly reportBase: string | null;
}
