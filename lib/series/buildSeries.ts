import type { SeriesCells } from "./cells.ts";
import { isoDay } from "./civil.ts";
import type { Collected } from "./collect.ts";
import { currentPeriod } from "./currentPeriod.ts";
import type { Resolution } from "./dateKeys.ts";
import { periodOfDays, weekStartOfDays } from "./findPeriod.ts";
import { ordinalOf, ordinalStart, weekdays } from "./periods.ts";
import type { Complain } from "./problems.ts";
import type { CombineRule, Reading } from "./reading.ts";
import type { Period, Problem, Series } from "./series.ts";
import { TableFault } from "./tableFault.ts";
import type { TableSettings } from "./tableSettings.ts";

/** The calendar of a table: its step, where weeks begin, and how that was found. */
export interface Calendar {
  readonly every: Period;
  readonly weekStart: number;
  readonly how: Reading["period"]["how"];
}

const hourLength = 3_600_000;

/** The ordinal of the period that holds a key. */
const ordinalOfKey = (key: number, resolution: Resolution, { every, weekStart }: Calendar) =>
  ordinalOf(every, resolution === "hour" && every === "hour" ? key * hourLength : key, weekStart);

/**
 * The step of the table: as set, as its dates state it, or from the distances between them.
 *
 * @throws TableFault when it cannot be told
 */
export function findCalendar(
  collected: Collected,
  resolution: Resolution,
  stated: Period | undefined,
  settings: TableSettings,
  complain: Complain,
): Calendar {
  const days = [...collected.keys].sort((a, b) => a - b);
  const weekStartFor = (every: Period) =>
    every !== "week"
      ? 0
      : settings.weekStartsOn
        ? weekdays.indexOf(settings.weekStartsOn)
        : stated === "week" || periodOfDays(days) !== "week"
          ? 0
          : weekStartOfDays(days);
  if (settings.every) return { every: settings.every, weekStart: weekStartFor(settings.every), how: "set" };
  if (stated) return { every: stated, weekStart: weekStartFor(stated), how: "format" };
  if (resolution === "hour") return { every: "hour", weekStart: 0, how: "dates" };
  const every = periodOfDays(days);
  if (every) return { every, weekStart: weekStartFor(every), how: "dates" };
  throw new TableFault(
    complain(
      "no-period",
      true,
      days.length < 2
        ? "there is only one date, so the step between periods cannot be told"
        : "the dates are spaced like no period",
      'say "every" in the settings of this table: hour, day, week, month, quarter or year',
    ),
  );
}

export interface Built {
  readonly series: Series[];
  readonly problems: readonly Problem[];
  readonly combine: Reading["combine"];
  readonly incompletePeriod: string | null;
  readonly laterKeys: ReadonlySet<number>;
}

/** Keys by period: key indexes ascending by key, each with the ordinal of its period. */
interface Grid {
  readonly order: Int32Array;
  readonly ordinals: Int32Array;
}

function layGrid(collected: Collected, resolution: Resolution, calendar: Calendar): Grid {
  const { keys } = collected;
  const order = Int32Array.from(keys.keys()).sort((a, b) => keys[a] - keys[b]);
  return { order, ordinals: order.map((index) => ordinalOfKey(keys[index], resolution, calendar)) };
}

interface Folding {
  readonly rule: CombineRule | undefined;
  readonly emptyMeans: "gap" | "zero";
}

/** How often a period holds several rows, where no rule was given. */
function countRepeats(cells: SeriesCells, grid: Grid, end: number) {
  let periods = 0;
  let several = 0;
  let rows = 0;
  let previous = Number.NaN;
  let inPeriod = 0;
  const close = () => {
    if (inPeriod > 0) periods++;
    if (inPeriod > 1) several++;
  };
  for (let at = 0; at < grid.order.length && grid.ordinals[at] < end; at++) {
    const index = grid.order[at];
    if (index >= cells.used || Number.isNaN(cells.values[index])) continue;
    if (grid.ordinals[at] !== previous) {
      close();
      inPeriod = 0;
      previous = grid.ordinals[at];
    }
    const here = cells.repeats?.get(index)?.count ?? 1;
    inPeriod += here;
    rows += here;
  }
  close();
  return { periods, several, rows };
}

/** One series on the grid up to `end` (exclusive), or `undefined` when it has no value. */
function foldSeries(
  cells: SeriesCells,
  grid: Grid,
  end: number,
  calendar: Calendar,
  { rule, emptyMeans }: Folding,
): { series: Series; conflicts: number[] } | undefined {
  let first = Number.NaN;
  let last = Number.NaN;
  for (let at = 0; at < grid.order.length && grid.ordinals[at] < end; at++) {
    const index = grid.order[at];
    if (index >= cells.used || Number.isNaN(cells.values[index])) continue;
    if (Number.isNaN(first)) first = grid.ordinals[at];
    last = grid.ordinals[at];
  }
  if (Number.isNaN(first)) return undefined;
  const values = new Float64Array(last - first + 1).fill(Number.NaN);
  const counts = rule === "mean" ? new Uint32Array(values.length) : undefined;
  const conflicts: number[] = [];
  for (let at = 0; at < grid.order.length && grid.ordinals[at] < end; at++) {
    const index = grid.order[at];
    const value = index < cells.used ? cells.values[index] : Number.NaN;
    if (Number.isNaN(value)) continue;
    const slot = grid.ordinals[at] - first;
    const before = values[slot];
    const isFirst = Number.isNaN(before);
    const repeat = cells.repeats?.get(index);
    if (rule === undefined) {
      if ((!isFirst && before !== value) || repeat?.differs) conflicts.push(index);
      else values[slot] = value;
    } else if (rule === "sum" || rule === "count") {
      const amount = repeat ? (rule === "count" ? repeat.count : repeat.sum) : value;
      values[slot] = isFirst ? amount : before + amount;
    } else if (rule === "mean") {
      values[slot] = isFirst ? value : before + value;
      if (counts) counts[slot] += cells.counts?.[index] ?? 1;
    } else if (rule === "max") values[slot] = isFirst ? value : Math.max(before, value);
    else values[slot] = value;
  }
  for (const index of conflicts) {
    const at = grid.order.indexOf(index);
    values[grid.ordinals[at] - first] = Number.NaN;
  }
  let observed = 0;
  for (let slot = 0; slot < values.length; slot++) {
    if (counts && counts[slot] > 0) values[slot] /= counts[slot];
    if (emptyMeans === "zero" && Number.isNaN(values[slot])) values[slot] = 0;
    if (!Number.isNaN(values[slot])) observed++;
  }
  return {
    series: {
      name: cells.name,
      period: calendar.every,
      start: ordinalStart(calendar.every, first, calendar.weekStart),
      values,
      observed,
      gaps: values.length - observed,
    },
    conflicts,
  };
}

const mostCells = 60_000_000;

/** Lays what was collected on the grid of periods that were over at `asOf`. */
export function buildSeries(
  collected: Collected,
  resolution: Resolution,
  calendar: Calendar,
  settings: TableSettings,
  asOf: Date | string,
  timeZone: string,
  complain: Complain,
): Built {
  const { every, weekStart } = calendar;
  const grid = layGrid(collected, resolution, calendar);
  const current = currentPeriod(asOf, every, timeZone, weekdays[weekStart]);
  const end = ordinalOf(every, every === "hour" ? Date.parse(current) : isoDay(current), weekStart);
  const span = grid.ordinals.length > 0 ? grid.ordinals[grid.ordinals.length - 1] - grid.ordinals[0] + 1 : 0;
  if (span > 200 + 400 * collected.keys.length || span * collected.series.length > mostCells)
    throw new TableFault(
      complain(
        "dates-far-apart",
        true,
        `the dates span ${span} periods of a ${every} with only ${collected.keys.length} dates between`,
        "look for a mistyped year, or say a longer step under every in the settings",
      ),
    );
  const problems: Problem[] = [];
  let rule = settings.combine;
  let combine: Reading["combine"] = rule ? { rule, how: "set" } : null;
  const repeats = collected.series.map((cells) => countRepeats(cells, grid, end));
  const periods = repeats.reduce((sum, one) => sum + one.periods, 0);
  const several = repeats.reduce((sum, one) => sum + one.several, 0);
  if (several === 0) combine = null;
  else if (!rule && several > 0.2 * periods) {
    rule = "sum";
    combine = { rule, how: "assumed" };
    problems.push(
      complain(
        "combine-assumed",
        false,
        `most periods have several rows; they were summed up`,
        'say "combine" in the settings: sum, mean, last, count or max; or name the column of names under "seriesName"',
      ),
    );
  }
  const series: Series[] = [];
  const conflicts = new Map<number, string>();
  for (const cells of collected.series) {
    const folded = foldSeries(cells, grid, end, calendar, { rule, emptyMeans: settings.emptyMeans ?? "gap" });
    if (!folded) continue;
    for (const index of folded.conflicts) if (!conflicts.has(index)) conflicts.set(index, cells.name);
    if (folded.series.observed > 0) series.push(folded.series);
  }
  for (const [index, name] of [...conflicts].slice(0, 5)) {
    const key = collected.keys[index];
    const start = ordinalStart(every, ordinalOfKey(key, resolution, calendar), weekStart);
    problems.push(
      complain(
        "repeated-date",
        false,
        `${start} has several values that differ; left as a gap`,
        'remove all but one, or say under "combine" in the settings which counts',
        { line: collected.lines[index], column: name },
      ),
    );
  }
  const reaches = grid.ordinals.some((ordinal) => ordinal === end);
  const laterKeys = new Set<number>();
  for (let at = 0; at < grid.order.length; at++) if (grid.ordinals[at] >= end) laterKeys.add(grid.order[at]);
  return { series, problems, combine, incompletePeriod: reaches ? current : null, laterKeys };
}
