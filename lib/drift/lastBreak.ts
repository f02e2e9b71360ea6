import { findBreaks } from "./findBreaks.ts";
import type { MonitorSettings } from "./monitor.ts";
import { termColumns, writeTerms } from "./terms.ts";

/** The last break in the past that a first reference must not be fitted across. */
export interface PastBreak {
  /** Place of the first value of the present behaviour, in a 95 % range of dates. */
  readonly index: number;
  readonly low: number;
  readonly high: number;
  /** Means on both sides, season and line apart. */
  readonly levelBefore: number;
  readonly levelAfter: number;
  readonly pValue: number;
}

/** A break must be plain: LWZ must choose it and supF reject none at this level. */
const level = 0.01;
/** Values looked back over: older breaks do not matter to a reference, and the search grows with the square. */
const farthestBack = 400;

/**
 * The last break of level or persistence in `values`, or `undefined`. The regression is one of one lag with the
 * terms of the settings; the break is in all of its coefficients.
 */
export function findLastBreak(values: Float64Array, settings: MonitorSettings): PastBreak | undefined {
  const offset = Math.max(0, values.length - farthestBack);
  const recent = values.subarray(offset);
  const terms = termColumns(settings);
  const regressors = Array.from({ length: terms - 1 }, () => new Float64Array(recent.length));
  const row = new Float64Array(terms);
  for (let time = 0; time < recent.length; time++) {
    writeTerms(row, 0, settings, time, recent.length, recent.length);
    for (let column = 1; column < terms; column++) regressors[column - 1][time] = row[column];
  }
  const columns = terms + 1;
  const rows = recent.reduce((sum, value) => sum + (Number.isNaN(value) ? 0 : 1), 0) - 1;
  if (rows < 60 || rows * 0.15 < 2 * columns) return undefined;
  const { breaks, pValue } = findBreaks(recent, { order: 1, regressors, maxBreaks: 3, criterion: "lwz" });
  const last = breaks.at(-1);
  if (last === undefined || pValue > level) return undefined;
  const before = breaks.at(-2)?.index ?? 0;
  const within = (index: number) => Math.min(Math.max(index, 0), recent.length - 1) + offset;
  return {
    index: last.index + offset,
    low: within(last.low),
    high: within(last.high),
    levelBefore: meanOf(recent, before, last.index),
    levelAfter: meanOf(recent, last.index, recent.length),
    pValue,
  };
}

function meanOf(values: Float64Array, from: number, to: number): number {
  const observed = values.subarray(from, to).filter((value) => !Number.isNaN(value));
  return observed.reduce((sum, value) => sum + value, 0) / observed.length;
}
