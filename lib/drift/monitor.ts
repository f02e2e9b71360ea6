import { tabulate } from "../numeric/tabulate.ts";
import type { ChangeKind, ChangeNotice } from "./notice.ts";

/** What a monitor watches a series with. */
export interface MonitorSettings {
  /** Looks over which the false-alarm rate holds; one look a value that is not a gap. */
  readonly looks: number;
  /** Chance that a series that never changes brings any lasting notice within `looks`. */
  readonly falseAlarmRate: number;
  readonly seed: number;
  /** The reference carries a straight line. */
  readonly trend: boolean;
  /** Length of the seasonal pattern in periods, 0 for none. */
  readonly season: number;
}

/**
 * A monitor at rest: plain data that survives JSON. A gap is `null`. It holds the values it was made on, so a
 * later revision of the past does not move its reference.
 */
export interface Monitor extends MonitorSettings {
  readonly schema: "monitor";
  readonly version: 1;
  readonly order: number;
  readonly reference: readonly (number | null)[];
  /** Values that arrived since. */
  readonly values: readonly (number | null)[];
  readonly looksUsed: number;
  /** Where boundaries come from: the fitted table, or paths simulated from this very reference. */
  readonly boundarySource: "table" | "bootstrap";
  readonly boundaries: readonly { readonly kind: ChangeKind; readonly boundary: number }[];
  /** By kind as in `boundaries`: the statistic after each arrived value, `null` where no look was made. */
  readonly statistics: readonly (readonly (number | null)[])[];
  /** The change noticed, provisional or confirmed; a monitor notices one and then awaits its successor. */
  readonly change: ChangeNotice | null;
  /** Indexes of the surprises reported. */
  readonly surprises: readonly number[];
}

/** JSON has no NaN: gaps are `null` at rest and `NaN` at work. */
export function toStored(values: ArrayLike<number>): (number | null)[] {
  return Array.from(values, (value) => (Number.isFinite(value) ? value : null));
}

export function fromStored(values: readonly (number | null)[]): Float64Array {
  return tabulate(values.length, (time) => values[time] ?? Number.NaN);
}
