import { buildSeries } from "./buildSeries.ts";
import type { DateFacts } from "./calendar.ts";
import { findClockUse } from "./clockUse.ts";
import { createCollector } from "./collect.ts";
import { speaksOfEnds } from "./columnNames.ts";
import { createKeyReader } from "./dateKeys.ts";
import { describeReading, type Source } from "./describeReading.ts";
import { createDoubts } from "./doubts.ts";
import { findOrder, refuseShortYearsInFront } from "./findOrder.ts";
import { type Complain, quoted } from "./problems.ts";
import type { Problem } from "./series.ts";
import { settleKeys } from "./settleKeys.ts";
import { TableFault } from "./tableFault.ts";
import type { TablePlan } from "./tablePlan.ts";
import type { ReadContext, TableResult } from "./tableResult.ts";
import type { TableSettings } from "./tableSettings.ts";

/** Takes the rows below the header one after another; then says what series they make. */
export interface Session {
  row(cells: readonly string[], line: number): void;
  /** @throws TableFault when no series can be made */
  finish(source: Source): TableResult;
}

/** Date cells looked at before reading, for clock times and row order. */
const mostProbed = 20_000;

/**
 * Opens the reading of a table whose plan is made.
 *
 * @throws TableFault when its dates can already be seen not to do
 */
export function openSession(
  plan: TablePlan,
  settings: TableSettings,
  context: ReadContext,
  complain: Complain,
): Session {
  const timeZone = settings.timeZone ?? context.timeZone ?? "UTC";
  const column = plan.names[plan.dateColumn];
  const dateCells = plan.sample
    .slice(0, mostProbed)
    .map(({ line, cells }) => ({ line, text: (cells[plan.dateColumn] ?? "").trim() }))
    .filter(({ text }) => text !== "");
  if (plan.dateFormat.name === "day-and-month" && settings.dateOrder === undefined)
    refuseShortYearsInFront(dateCells, column, complain);
  const clock = findClockUse(
    dateCells.map(({ text }) => text),
    plan.dateFormat,
  );
  if (clock.resolution === undefined && settings.every === undefined)
    throw new TableFault(
      complain(
        "no-period",
        true,
        `the rows in ${quoted(column)} are some hours apart, which is no period known here`,
        'say "every" for this table in the settings, such as "every": "day" with "combine": "mean"',
        { column },
      ),
    );
  const resolution =
    settings.every === undefined ? (clock.resolution ?? "day") : settings.every === "hour" ? "hour" : "day";
  const keyReader = createKeyReader({
    format: plan.dateFormat,
    resolution,
    midnightsOnly: clock.midnightsOnly,
    timeZone,
  });
  const doubts = createDoubts(plan, complain);
  const table = context.table ?? "table";
  const collector = createCollector(
    plan,
    keyReader,
    doubts,
    { rule: settings.combine, newestFirst: clock.newestFirst, table },
    complain,
  );
  const facts: DateFacts = {
    resolution,
    stated: clock.stated,
    hasTimes: clock.hasTimes,
    datesAreEnds: speaksOfEnds(column),
    column,
  };
  return {
    row: collector.row,
    finish(source) {
      const collected = collector.collected();
      const isSilent = (column: number) =>
        settings.values === undefined && !collected.hasValues(column) && plan.valueColumns.length > 1;
      const rowProblems = doubts.problems({ read: collected.read, isSilent });
      if (collected.dates.keys.length === 0) return nothingDated(rowProblems, complain);
      const { dates } = collected;
      const parts = dates.keys.filter((_, index) => dates.kinds[index] === "parts");
      const example = dateCells[0] ?? { line: plan.headerLine + 1, text: "" };
      const order =
        parts.length === 0
          ? null
          : settings.dateOrder
            ? { order: settings.dateOrder, how: "set" }
            : findOrder(parts, keyReader, resolution, example, column, complain);
      const settled = settleKeys(dates, resolution, order?.order ?? null, timeZone, column, complain);
      const built = buildSeries(collected, settled.at, facts, settings, context.asOf, timeZone, complain);
      const problems = [...rowProblems, ...settled.problems, ...built.problems];
      if (built.series.length === 0) problems.push(nothingRead(built.later > 0, complain));
      return {
        series: built.series,
        problems,
        reading: describeReading(plan, source, order, collected, built, clock.hasTimes),
      };
    },
  };
}

function nothingDated(problems: Problem[], complain: Complain): TableResult {
  const fatal = problems.some((problem) => problem.fatal)
    ? []
    : [complain("no-values", true, "no row of the table can be used", "look at the first rows of the table")];
  return { series: [], problems: [...problems, ...fatal], reading: null };
}

function nothingRead(hasLater: boolean, complain: Complain) {
  return hasLater
    ? complain(
        "no-complete-period",
        true,
        "the table holds no value of a period that is over",
        "wait until the first period is over, or see whether the dates lie in the future by mistake",
      )
    : complain("no-values", true, "the table holds no values", "fill in the numbers");
}
