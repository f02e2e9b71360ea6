import type { DateKeys } from "./collect.ts";
import { type DateOrder, instantsOfHour, type Resolution, settleParts } from "./dateKeys.ts";
import type { Complain } from "./problems.ts";
import type { Problem } from "./series.ts";

export interface SettledKeys {
  /** By key index: the day number, or for hours the instant in milliseconds; `NaN` for what does not exist. */
  readonly at: Float64Array;
  readonly problems: readonly Problem[];
}

const hourLength = 3_600_000;

/**
 * Turns the keys of a table into days or instants, now that its whole column of dates is known. An hour that clocks
 * skip in spring has no instant: then the table's clock is not that of the zone.
 */
export function settleKeys(
  { keys, kinds, secondPasses, lines }: DateKeys,
  resolution: Resolution,
  order: DateOrder | null,
  timeZone: string,
  column: string,
  complain: Complain,
): SettledKeys {
  const at = new Float64Array(keys.length);
  const skipped: number[] = [];
  const twice = new Set([...secondPasses].map((index) => keys[index]));
  const firstPasses = new Set(keys.filter((key, index) => twice.has(key) && !secondPasses.has(index)));
  for (let index = 0; index < keys.length; index++) {
    const key = keys[index];
    const kind = kinds[index];
    const local = kind === "parts" ? settleParts(key, resolution, order ?? "day-first") : key;
    if (resolution === "day") at[index] = local;
    else if (kind === "instant") at[index] = local * hourLength;
    else {
      const instants = Number.isNaN(local) ? [] : instantsOfHour(local, timeZone);
      at[index] =
        (secondPasses.has(index) && firstPasses.has(key) ? instants[1] : undefined) ??
        instants[0] ??
        Number.NaN;
      if (instants.length === 0) skipped.push(lines[index]);
    }
  }
  const problems = skipped
    .slice(0, 1)
    .map((line) =>
      complain(
        "skipped-hour",
        false,
        `this hour does not exist in ${timeZone}, where clocks go forward over it; ${skipped.length === 1 ? "it is" : `${skipped.length} such hours are`} left out`,
        'if the table\'s clock stays the same all year, say so with "timeZone", such as "UTC", for this table in the settings',
        { line, column },
      ),
    );
  return { at, problems };
}
