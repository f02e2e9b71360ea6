import type { Period } from "../series/series.ts";
import { roundTo, type WriteNumber } from "./numbers.ts";

/** The step a length of time in periods is said to: halves below three, wholes below twenty, fives beyond. */
export function spanStep(periods: number): number {
  return periods < 3 ? 0.5 : periods < 20 ? 1 : 5;
}

/**
 * A length of time in periods, as precisely as an estimate of it deserves.
 *
 * @example span(5.8, "week", write) // "about 6 weeks"
 */
export function span(periods: number, period: Period, write: WriteNumber): string {
  if (periods < 0.75) return `less than ${anOrA(period)} ${period}`;
  const step = spanStep(periods);
  const rounded = step === 0.5 ? Math.round(periods * 2) / 2 : roundTo(periods / step, 1) * step;
  const said = write(rounded, Number.isInteger(rounded) ? 1 : 0.1);
  return `about ${said} ${rounded === 1 ? period : `${period}s`}`;
}

export const anOrA = (period: Period) => (period === "hour" ? "an" : "a");

/** "1 week", "8 weeks". */
export function countOf(count: number, noun: string, write: WriteNumber): string {
  return `${write(count, 1)} ${count === 1 ? noun : `${noun}s`}`;
}
