import { type Calendar, type DateFacts, findCalendar } from "./calendar.ts";
import type { Collected } from "./collect.ts";
import { countRepeats, foldSeries } from "./foldSeries.ts";
import { type Grid, layGrid, startOf } from "./grid.ts";
import { byDate, withoutLonelyDates } from "./lonelyDates.ts";
import type { Complain } from "./problems.ts";
import type { Reading } from "./reading.ts";
import type { Problem, Series } from "./series.ts";
import { TableFault } from "./tableFault.ts";
import type { TableSettings } from "./tableSettings.ts";

export interface Built {
  readonly series: Series[];
  readonly problems: readonly Problem[];
  readonly calendar: Calendar;
  readonly combine: Reading["combine"];
  readonly incompletePeriod: string | null;
  /** Rows of the period that is not over, and after it. */
  readonly later: number;
}

/** Values that fit into memory beside what was collected. */
const mostValues = 60_000_000;

function refuseWideSpans(
  grid: Grid,
  calendar: Calendar,
  collected: Collected,
  column: string,
  complain: Complain,
) {
  const { ordinals } = grid;
  if (ordinals.length === 0) return;
  const span = ordinals[ordinals.length - 1] - ordinals[0] + 1;
  if (span <= 1000 + 200 * ordinals.length && span * collected.series.length <= mostValues) return;
  const [from, to] = [startOf(calendar, ordinals[0]), startOf(calendar, ordinals[ordinals.length - 1])];
  throw new TableFault(
    complain(
      "dates-far-apart",
      true,
      `the dates run from ${from} to ${to}: ${span} periods of one ${calendar.every}, with dates in ${ordinals.length}`,
      "look for a mistyped year, or say a longer step under every in the settings",
      { column },
    ),
  );
}

/** Days or instants, each once, ascending. */
function distinctOf(order: Int32Array, at: Float64Array): number[] {
  const distinct: number[] = [];
  for (const index of order) if (distinct.at(-1) !== at[index]) distinct.push(at[index]);
  return distinct;
}

/** The rule for several rows of a period: as set; a sum for rows that are clearly parts of a period; else none. */
function chooseRule(collected: Collected, grid: Grid, facts: DateFacts, settings: TableSettings) {
  let periods = 0;
  let several = 0;
  for (const cells of collected.series) {
    const counted = countRepeats(cells, grid);
    periods += counted.periods;
    several += counted.several;
  }
  const partsOfPeriods =
    several >= 0.5 * periods || (several > 0.2 * periods && (facts.hasTimes || settings.every !== undefined));
  const hasSeveral = several > 0 || collected.series.some((cells) => cells.hasSeveral);
  const rule = settings.combine ?? (several > 0 && partsOfPeriods ? ("sum" as const) : undefined);
  return { rule, hasSeveral, periods, isAssumed: settings.combine === undefined && rule !== undefined };
}

/**
 * Lays what was collected on the grid of the periods that are over at `asOf`.
 *
 * @param at day or instant by key index
 * @throws TableFault when the dates allow no grid
 */
export function buildSeries(
  collected: Collected,
  at: Float64Array,
  facts: DateFacts,
  settings: TableSettings,
  asOf: Date | string,
  timeZone: string,
  complain: Complain,
): Built {
  const { order, problems } = withoutLonelyDates(byDate(at), at, collected.dates, facts, complain);
  const distinct = distinctOf(order, at);
  const calendar = findCalendar(distinct, facts, settings, timeZone, complain);
  const grid = layGrid(order, at, calendar, asOf, timeZone);
  refuseWideSpans(grid, calendar, collected, facts.column, complain);
  const { rule, hasSeveral, periods, isAssumed } = chooseRule(collected, grid, facts, settings);
  if (isAssumed)
    problems.push(
      complain(
        "combine-assumed",
        false,
        `there are several rows a ${calendar.every}; they were summed up`,
        'say "combine" for this table in the settings (sum, mean, last, count or max), or name the column of names under "seriesName"',
      ),
    );
  const series: Series[] = [];
  const conflicts = new Map<number, string>();
  let conflicting = 0;
  for (const cells of collected.series) {
    const folded = foldSeries(cells, grid, calendar, rule, settings.emptyMeans ?? "gap");
    if (!folded) continue;
    conflicting += folded.conflicts.size;
    for (const ordinal of folded.conflicts) if (!conflicts.has(ordinal)) conflicts.set(ordinal, cells.name);
    if (folded.series.observed > 0) series.push(folded.series);
  }
  for (const [ordinal, name] of [...conflicts].slice(0, 1)) {
    const lines = [...grid.order]
      .filter((_, place) => grid.ordinals[place] === ordinal)
      .map((index) => collected.dates.lines[index]);
    const where =
      lines.length > 1
        ? ` (lines ${lines
            .sort((a, b) => a - b)
            .slice(0, 4)
            .join(", ")})`
        : "";
    const rest = conflicting === 1 ? "" : `; so it is ${conflicting} times in all`;
    problems.push(
      complain(
        "repeated-date",
        conflicting > 0.2 * periods,
        `the ${calendar.every} of ${startOf(calendar, ordinal)} has several rows with different values${where}, and is left as a gap${rest}`,
        'keep the row that is right, or say "combine" for this table in the settings',
        { line: Math.min(...lines), column: name },
      ),
    );
  }
  let later = 0;
  for (let place = grid.complete; place < grid.order.length; place++)
    later += collected.dates.rows[grid.order[place]];
  const reaches = grid.ordinals.includes(grid.current);
  return {
    series,
    problems,
    calendar,
    combine: hasSeveral && rule ? { rule, how: isAssumed ? "assumed" : "set" } : null,
    incompletePeriod: reaches ? startOf(calendar, grid.current) : null,
    later,
  };
}
