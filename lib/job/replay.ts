import type { Period } from "../series/series.ts";
import { asOfText } from "./keys.ts";
import { type RunOptions, runJob } from "./run.ts";
import type { RunSummary } from "./summary.ts";

const millisecondsIn = { hour: 3_600_000, day: 86_400_000, week: 7 * 86_400_000 } as const;
const monthsIn = { month: 1, quarter: 3, year: 12 } as const;

/** Steps on the clock of Greenwich, the same on every machine; a day of the month that is missing becomes the last. */
function stepFrom(first: Date, every: Period, steps: number): Date {
  if (every === "hour" || every === "day" || every === "week")
    return new Date(first.getTime() + steps * millisecondsIn[every]);
  const moved = new Date(first);
  moved.setUTCMonth(first.getUTCMonth() + steps * monthsIn[every]);
  if (moved.getUTCDate() !== first.getUTCDate()) moved.setUTCDate(0);
  return moved;
}

/**
 * The instants of due runs, `from` first, one `every` step apart, none after `until`. Counted from `from`, so that
 * the 31st does not drift to the 28th for good.
 *
 * @example dueRuns("2026-11-16T06:00:00Z", "2026-11-30T06:00:00Z", "week").length // 3
 */
export function dueRuns(from: Date | string, until: Date | string, every: Period): string[] {
  const first = new Date(asOfText(from));
  const last = new Date(asOfText(until));
  if (first > last)
    throw new RangeError(`replay must start before its end: ${asOfText(from)} is after ${asOfText(until)}`);
  const instants: string[] = [];
  for (let step = 0; ; step++) {
    const instant = stepFrom(first, every, step);
    if (instant > last) return instants;
    instants.push(asOfText(instant));
  }
}

/**
 * Runs each due instant of the past in turn, so that history becomes runs: each sees only what was complete by then.
 * Posts nothing: a replay shows what would have been said.
 */
export async function replayRuns(
  options: Omit<RunOptions, "asOf" | "webhooks" | "replaying"> & {
    readonly from: Date | string;
    readonly until: Date | string;
    readonly every: Period;
  },
): Promise<RunSummary[]> {
  const instants = dueRuns(options.from, options.until, options.every);
  const summaries: RunSummary[] = [];
  for (const [index, asOf] of instants.entries()) {
    options.progress?.({ stage: "run", asOf, done: index, of: instants.length });
    summaries.push(await runJob({ ...options, asOf, webhooks: [], replaying: true, progress: undefined }));
  }
  options.progress?.({
    stage: "run",
    asOf: instants[instants.length - 1],
    done: instants.length,
    of: instants.length,
  });
  return summaries;
}
