import { tabulate } from "../numeric/tabulate.ts";
import { requireWhole } from "./checks.ts";

// Columns for `fitAutoregression`'s regressors. `start` continues a column past the data: with n values,
// `trendColumn(h, n)` is the next h entries of `trendColumn(n)`.

/** 1, 1, 1, … */
export function constantColumn(length: number): Float64Array {
  return new Float64Array(length).fill(1);
}

/** t = start + 1, start + 2, … */
export function trendColumn(length: number, start = 0): Float64Array {
  return tabulate(length, (i) => start + i + 1);
}

/**
 * cos(2πkt/period), sin(2πkt/period) for k = 1..pairs with t = start + 1, …: a season of any, even fractional,
 * length (Harvey 1989, section 2.3.4). The sine of k = period/2, which is zero, is left out.
 *
 * Throws `RangeError` when `pairs` passes period/2.
 */
export function harmonicColumns(length: number, period: number, pairs: number, start = 0): Float64Array[] {
  requireWhole("harmonicColumns", "pairs", pairs, 0);
  if (!(period >= 2 && pairs <= period / 2)) {
    throw new RangeError(`harmonicColumns needs at most period/2 pairs, got ${pairs} for period ${period}`);
  }
  const columns: Float64Array[] = [];
  for (let k = 1; k <= pairs; k++) {
    // The angle is taken modulo a whole turn first, so that late entries are as exact as early ones.
    const angle = (i: number) => (2 * Math.PI * ((k * (start + i + 1)) % period)) / period;
    columns.push(tabulate(length, (i) => Math.cos(angle(i))));
    if (2 * k < period) columns.push(tabulate(length, (i) => Math.sin(angle(i))));
  }
  return columns;
}

/**
 * period − 1 columns of seasonal dummies in contrast form: column s is 1 in season s, −1 in the last season, else
 * 0, so they leave the level alone. The first entry belongs to season `start % period`.
 */
export function seasonalColumns(length: number, period: number, start = 0): Float64Array[] {
  requireWhole("seasonalColumns", "period", period, 2);
  return Array.from({ length: period - 1 }, (_, season) =>
    tabulate(length, (i) => {
      const now = (start + i) % period;
      if (now === season) return 1;
      return now === period - 1 ? -1 : 0;
    }),
  );
}

/** 0 before index `at`, 1 from there on: a lasting shift of the level. */
export function stepColumn(length: number, at: number, start = 0): Float64Array {
  return tabulate(length, (i) => (start + i >= at ? 1 : 0));
}

/** 1 at each of the given indexes, else 0: an event. */
export function eventColumn(length: number, at: readonly number[], start = 0): Float64Array {
  const places = new Set(at);
  return tabulate(length, (i) => (places.has(start + i) ? 1 : 0));
}
