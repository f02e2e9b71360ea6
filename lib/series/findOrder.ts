import { emptyDateCell } from "./dateCell.ts";
import type { DateFormat } from "./dateFormats.ts";
import type { DateOrder } from "./dateKeys.ts";
import { type Complain, quoted } from "./problems.ts";
import { TableFault } from "./tableFault.ts";

/**
 * Whether a column of numeric dates puts the day or the month first, by the first date in it that can be read one way
 * only. `null` when no cell tells.
 *
 * @throws TableFault when two cells contradict each other
 */
export function findOrder(
  cells: readonly { readonly line: number; readonly text: string }[],
  format: DateFormat,
  column: string,
  complain: Complain,
): { readonly order: DateOrder; readonly how: string } | null {
  const cell = emptyDateCell();
  const evidence = new Map<DateOrder, { line: number; text: string }>();
  let dotted: string | undefined;
  for (const { line, text } of cells) {
    if (!format.read(text, cell) || !Number.isNaN(cell.day)) continue;
    const order = cell.first > 12 ? "day-first" : cell.second > 12 ? "month-first" : undefined;
    if (order && !evidence.has(order)) evidence.set(order, { line, text });
    if (/\d\.\d/.test(text.slice(0, 6))) dotted ??= text;
  }
  const dayFirst = evidence.get("day-first");
  const monthFirst = evidence.get("month-first");
  if (dayFirst && monthFirst)
    throw new TableFault(
      complain(
        "mixed-date-orders",
        true,
        `${quoted(dayFirst.text)} in line ${dayFirst.line} has the day first and ${quoted(monthFirst.text)} in line ${monthFirst.line} the month`,
        "write all dates one way, best as 2026-11-30",
        { line: Math.max(dayFirst.line, monthFirst.line), column },
      ),
    );
  if (dayFirst) return { order: "day-first", how: `${quoted(dayFirst.text)} in line ${dayFirst.line}` };
  if (monthFirst)
    return { order: "month-first", how: `${quoted(monthFirst.text)} in line ${monthFirst.line}` };
  if (dotted !== undefined)
    return { order: "day-first", how: "dates written with points have the day first" };
  return null;
}
