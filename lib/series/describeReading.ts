import type { Built } from "./buildSeries.ts";
import type { Collected } from "./collect.ts";
import type { FoundOrder } from "./findOrder.ts";
import { weekdays } from "./periods.ts";
import type { Reading } from "./reading.ts";
import type { TablePlan } from "./tablePlan.ts";

/** Where the rows came from. */
export interface Source {
  readonly format: Reading["format"];
  readonly compressed: boolean;
  readonly encoding: string | null;
}

const delimiterNames: Record<string, string> = { ",": "comma", ";": "semicolon", "\t": "tab", "|": "pipe" };

/** Puts together what was taken for what. */
export function describeReading(
  plan: TablePlan,
  source: Source,
  order: FoundOrder | null,
  collected: Collected,
  built: Built,
  hasTimes: boolean,
): Reading {
  const roleOf = (at: number): Reading["columns"][number]["role"] => {
    if (at === plan.dateColumn) return plan.dateFormat.name === "period-label" ? "period" : "date";
    if (at === plan.seriesColumn) return "series";
    return plan.valueColumns.includes(at) ? "value" : "ignored";
  };
  const dated = collected.dates.rows.reduce((sum, rows) => sum + rows, 0);
  const { every, weekStart, how } = built.calendar;
  const patterns = plan.dateFormat.pattern.split(" or ");
  const pattern =
    order?.order === "month-first" ? patterns[1] : order ? patterns[0] : plan.dateFormat.pattern;
  const isText = source.format === "text";
  return {
    ...source,
    delimiter: isText ? delimiterNames[plan.delimiter] : null,
    headerLine: isText ? plan.headerLine : null,
    columns: plan.names.map((name, at) => ({ name, role: roleOf(at) })),
    date: {
      column: plan.names[plan.dateColumn],
      format: `${pattern}${hasTimes && !plan.dateFormat.digitsOnly ? " hh:mm" : ""}`,
      order: order?.order ?? null,
      how: order?.how ?? null,
    },
    decimal: { mark: plan.style.decimal, how: plan.decimalHow },
    shape: plan.seriesColumn === null ? "wide" : "long",
    period: { every, weekStartsOn: every === "week" ? weekdays[weekStart] : null, how },
    combine: built.combine,
    incompletePeriod: built.incompletePeriod,
    rows: {
      read: collected.read,
      used: dated - built.later,
      ignored: collected.read - dated,
      later: built.later,
    },
  };
}
