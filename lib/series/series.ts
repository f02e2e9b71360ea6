/** The calendar steps a series may have. */
export type Period = "hour" | "day" | "week" | "month" | "quarter" | "year";

/**
 * A regular series: one value a period, from `start` on, without holes in the index.
 * `start` is the ISO date of the first period (an ISO instant ending in `Z` for hours).
 * A period without an observation is `NaN` in `values`; `observed + gaps === values.length`.
 */
export interface Series {
  readonly name: string;
  readonly period: Period;
  readonly start: string;
  readonly values: Float64Array;
  readonly observed: number;
  readonly gaps: number;
}

/** Something in a user's table that a person should know of; `fatal` when nothing could be read. */
export interface Problem {
  readonly table: string;
  /** 1-based line in the file as an editor counts. */
  readonly line?: number;
  readonly column?: string;
  /** Stable kebab-case identifier, such as `no-header`. */
  readonly code: string;
  readonly message: string;
  readonly remedy: string;
  readonly fatal: boolean;
}
