import { addValue, emptyCells, type SeriesCells } from "./cells.ts";
import type { DateKeys } from "./dateKeys.ts";
import { isMissing, parseNumber } from "./numbers.ts";
import { type Complain, quoted } from "./problems.ts";
import type { CombineRule } from "./reading.ts";
import type { Problem } from "./series.ts";
import { TableFault } from "./tableFault.ts";
import { cleanName, type TablePlan } from "./tablePlan.ts";

/** Observations by series and key, in the order the keys were met. */
export interface Collected {
  readonly series: readonly SeriesCells[];
  /** Days or hours, by key index. */
  readonly keys: readonly number[];
  /** Line where each key was first met. */
  readonly lines: readonly number[];
  readonly problems: readonly Problem[];
  readonly read: number;
  readonly used: number;
}

export interface Collector {
  row(cells: readonly string[], line: number): void;
  finish(): Collected;
}

/** More names than any table of series has: the wrong column was named. */
const mostSeries = 100_000;

interface Doubt {
  count: number;
  readonly line: number;
  readonly text: string;
}

/** Gathers the rows of a table, whatever their order, one after another. */
export function createCollector(
  plan: TablePlan,
  dateKeys: DateKeys,
  rule: CombineRule | undefined,
  table: string,
  complain: Complain,
): Collector {
  const { names, dateColumn, seriesColumn, valueColumns, style } = plan;
  const width = names.length;
  const columns = valueColumns.length > 0 ? valueColumns : [dateColumn];
  const isCount = rule === "count";
  const series: SeriesCells[] = [];
  const byName = new Map<string, SeriesCells[]>();
  const seriesOf = (name: string | undefined): SeriesCells[] => {
    const made = columns.map((column) => {
      const label = valueColumns.length > 0 ? names[column] : (table.split("/").at(-1) ?? "count");
      return emptyCells(name === undefined ? label : columns.length === 1 ? name : `${name}, ${label}`);
    });
    series.push(...made);
    if (series.length > mostSeries)
      throw new TableFault(
        complain(
          "too-many-series",
          true,
          `the column ${quoted(names[seriesColumn ?? 0])} holds more than ${mostSeries} different names`,
          "name the right column under seriesName in the settings, or null when there is none",
          { column: names[seriesColumn ?? 0] },
        ),
      );
    return made;
  };
  const wide = seriesColumn === null ? seriesOf(undefined) : undefined;
  const indexOf = new Map<number, number>();
  const keys: number[] = [];
  const lines: number[] = [];
  let lastKey = Number.NaN;
  let lastIndex = -1;
  let read = 0;
  let used = 0;
  let dateless: Doubt[] = [];
  const dateDoubts: Doubt[] = [];
  const numberDoubts = new Map<number, Doubt>();
  let wideRow: Doubt | undefined;
  let nameless: Doubt | undefined;

  const again = (doubt: Doubt | undefined, line: number, text: string): Doubt => {
    if (!doubt) return { count: 1, line, text };
    doubt.count++;
    return doubt;
  };
  const numberOf = (text: string, column: number, line: number): number => {
    const value = parseNumber(text, style);
    if (!Number.isNaN(value) || isMissing(text)) return value;
    numberDoubts.set(column, again(numberDoubts.get(column), line, text));
    return Number.NaN;
  };

  return {
    row(cells, line) {
      read++;
      const key = dateKeys.read((cells[dateColumn] ?? "").trim());
      if (Number.isNaN(key)) {
        if (cells.some((cell) => cell.trim() !== ""))
          dateless.push({ count: 1, line, text: cells[dateColumn] ?? "" });
        else read--;
        return;
      }
      if (dateless.length > 0) {
        dateDoubts.push(...dateless.slice(0, 1000));
        dateless = [];
      }
      if (cells.length > width && cells.slice(width).some((cell) => cell.trim() !== "")) {
        wideRow = again(wideRow, line, cells.join(plan.delimiter));
        return;
      }
      let into = wide;
      if (seriesColumn !== null) {
        const cell = cells[seriesColumn] ?? "";
        into = byName.get(cell);
        if (!into) {
          // Copied, so that the name does not keep its whole piece of the file in memory.
          const name = Buffer.from(cleanName(cell)).toString();
          if (name === "") {
            nameless = again(nameless, line, cells.join(plan.delimiter));
            return;
          }
          into = byName.get(name) ?? seriesOf(name);
          byName.set(name, into);
          byName.set(Buffer.from(cell).toString(), into);
        }
      }
      if (key !== lastKey) {
        lastKey = key;
        lastIndex = indexOf.get(key) ?? -1;
        if (lastIndex < 0) {
          lastIndex = keys.length;
          indexOf.set(key, lastIndex);
          keys.push(key);
          lines.push(line);
        }
      }
      used++;
      const moment = dateKeys.lastMoment();
      for (let at = 0; at < columns.length; at++) {
        const text = cells[columns[at]];
        if (text === undefined || text === "") continue;
        const value = isCount ? (isMissing(text) ? Number.NaN : 1) : numberOf(text, columns[at], line);
        if (!Number.isNaN(value)) addValue((into as SeriesCells[])[at], lastIndex, value, rule, moment, line);
      }
    },
    finish() {
      const problems: Problem[] = [];
      const others = (count: number) =>
        count === 1 ? "" : count === 2 ? "; one more like it" : `; ${count - 1} more like it`;
      if (dateDoubts.length > 0) {
        const [first] = dateDoubts;
        problems.push(
          complain(
            "bad-date",
            dateDoubts.length > 0.5 * read,
            `${first.text.trim() === "" ? "the date is empty" : `${quoted(first.text)} is no date written as ${plan.dateFormat.pattern}`}${others(dateDoubts.length)}; left out`,
            "correct the date",
            { line: first.line, column: names[dateColumn] },
          ),
        );
      }
      if (wideRow)
        problems.push(
          complain(
            "too-many-cells",
            wideRow.count > 0.5 * read,
            `the row has more cells than the header (${quoted(wideRow.text)})${others(wideRow.count)}; left out`,
            `put cells that hold ${quoted(plan.delimiter)} in quotes: a number such as 1,234 too`,
            { line: wideRow.line },
          ),
        );
      if (nameless)
        problems.push(
          complain(
            "no-name",
            false,
            `the row does not say which series it belongs to${others(nameless.count)}; left out`,
            `fill in ${quoted(names[seriesColumn ?? 0])}`,
            { line: nameless.line, column: names[seriesColumn ?? 0] },
          ),
        );
      for (const [column, doubt] of numberDoubts)
        problems.push(
          complain(
            "bad-number",
            false,
            `${quoted(doubt.text)} is no number with a decimal ${style.decimal === "." ? "point" : "comma"}${others(doubt.count)}; taken as a gap`,
            "correct it, or leave the cell empty if the value is not known",
            { line: doubt.line, column: names[column] },
          ),
        );
      return { series, keys, lines, problems, read, used };
    },
  };
}
