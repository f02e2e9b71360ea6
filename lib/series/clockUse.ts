import { dayNumber } from "./civil.ts";
import { emptyDateCell } from "./dateCell.ts";
import type { DateFormat } from "./dateFormat.ts";
import type { Resolution } from "./dateKeys.ts";
import { stepOfInstants } from "./findPeriod.ts";
import type { Period } from "./series.ts";

/** What the dates at the head of a table show of clock times and calendar units. */
export interface ClockUse {
  /** How finely rows must be kept; `undefined` for steps of some hours, which are no period. */
  readonly resolution: Resolution | undefined;
  /** Some cell has a clock time other than midnight. */
  readonly hasTimes: boolean;
  /** Every instant is a midnight in UTC: days were meant. */
  readonly midnightsOnly: boolean;
  /** The period the way of writing names, such as month for 2026-11. */
  readonly stated: Period | undefined;
  /** Rows run from new to old. */
  readonly newestFirst: boolean;
}

const grains = ["instant", "day", "week", "month", "quarter", "year"] as const;

/** Looks at date cells in row order. */
export function findClockUse(texts: readonly string[], format: DateFormat): ClockUse {
  const cell = emptyDateCell();
  const moments: number[] = [];
  let hasTimes = false;
  let finest = grains.length - 1;
  for (const text of texts) {
    if (!format.read(text, cell)) continue;
    finest = Math.min(finest, grains.indexOf(cell.grain));
    if (cell.clock > 0) hasTimes = true;
    // With day and month not settled yet, their order does not matter here: only clock steps are looked at.
    const day = Number.isNaN(cell.day)
      ? dayNumber(cell.year, 1, 1) + cell.first * 31 + cell.second
      : cell.day;
    moments.push(day * 86_400_000 + Math.max(cell.clock, 0) - (Number.isNaN(cell.offset) ? 0 : cell.offset));
  }
  let rises = 0;
  for (let at = 1; at < moments.length; at++) rises += Math.sign(moments[at] - moments[at - 1]);
  const grain = grains[finest];
  return {
    resolution: hasTimes ? stepOfInstants([...new Set(moments)].sort((a, b) => a - b)) : "day",
    hasTimes,
    midnightsOnly: !hasTimes,
    stated: grain === "instant" || grain === "day" ? undefined : grain,
    newestFirst: rises < 0,
  };
}
