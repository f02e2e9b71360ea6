import { addValue, emptyCells, type SeriesCells } from "./cells.ts";
import { cleanName } from "./columnNames.ts";
import type { KeyKind, KeyReader } from "./dateKeys.ts";
import type { Doubts } from "./doubts.ts";
import { isMissing, parseNumber } from "./numbers.ts";
import { type Complain, quoted } from "./problems.ts";
import type { CombineRule } from "./reading.ts";
import { TableFault } from "./tableFault.ts";
import type { TablePlan } from "./tablePlan.ts";

/** Observations by series and key, in the order the keys were met. */
export interface Collected {
  readonly series: readonly SeriesCells[];
  readonly dates: DateKeys;
  /** Rows below the header that are not blank. */
  readonly read: number;
  /** Some series of a column has a value. */
  readonly hasValues: (column: number) => boolean;
}

/** The distinct dates of a table, as lists by key index: a table may have hundreds of thousands. */
export interface DateKeys {
  /** As the key reader gave them. */
  readonly keys: number[];
  readonly kinds: KeyKind[];
  /** The local hour came a second time: clocks had gone back. */
  readonly secondPasses: ReadonlySet<number>;
  /** Line where each was first met. */
  readonly lines: number[];
  /** Rows of each. */
  readonly rows: number[];
}

export interface Collector {
  row(cells: readonly string[], line: number): void;
  collected(): Collected;
}

/** More names than any table of series has: the wrong column was named. */
const mostSeries = 100_000;

/** Copied, so that a short name does not keep its whole piece of the file in memory. */
const copied = (text: string) => Buffer.from(text).toString();

/** What tells the two passes of a repeated hour apart: the clock jumping back, or standing still, in row order. */
function createPassTest(newestFirst: boolean): (owner: string, key: number, moment: number) => boolean {
  const last = new Map<string, { key: number; moment: number; turned: boolean }>();
  return (owner, key, moment) => {
    const before = last.get(owner);
    const isSame = before?.key === key;
    const turned =
      isSame && (before.turned || (newestFirst ? moment >= before.moment : moment <= before.moment));
    last.set(owner, { key, moment, turned });
    return turned !== newestFirst;
  };
}

/** Gathers the rows of a table, whatever their order, one after another. */
export function createCollector(
  plan: TablePlan,
  keyReader: KeyReader,
  doubts: Doubts,
  options: { readonly rule: CombineRule | undefined; readonly newestFirst: boolean; readonly table: string },
  complain: Complain,
): Collector {
  const { names, dateColumn, seriesColumn, valueColumns, style } = plan;
  const { rule } = options;
  const width = names.length;
  const columns = valueColumns.length > 0 ? valueColumns : [dateColumn];
  const labels =
    valueColumns.length > 0 ? columns.map((at) => names[at]) : [options.table.split("/").at(-1) ?? "rows"];
  const series: SeriesCells[] = [];
  const byName = new Map<string, SeriesCells[]>();
  const secondPasses = new Set<number>();
  const dates: DateKeys = { keys: [], kinds: [], secondPasses, lines: [], rows: [] };
  const indexOf = new Map<number, number>();
  const isSecondPass = createPassTest(options.newestFirst);
  let read = 0;
  let lastKey = Number.NaN;
  let lastIndex = -1;

  const addSeries = (name: string | undefined): SeriesCells[] => {
    const made = labels.map((label) =>
      emptyCells(name === undefined ? label : labels.length === 1 ? name : `${name}, ${label}`),
    );
    series.push(...made);
    if (series.length > mostSeries) {
      const column = names[seriesColumn ?? 0];
      throw new TableFault(
        complain(
          "too-many-series",
          true,
          `the column ${quoted(column)} holds more than ${mostSeries} different names`,
          "name the right column under seriesName in the settings, or null when there is none",
          { column },
        ),
      );
    }
    return made;
  };
  const wide = seriesColumn === null ? addSeries(undefined) : undefined;
  const seriesOf = (cell: string): SeriesCells[] | undefined => {
    const known = byName.get(cell);
    if (known) return known;
    const name = copied(cleanName(cell));
    if (name === "") return undefined;
    const into = byName.get(name) ?? addSeries(name);
    byName.set(name, into);
    byName.set(copied(cell), into);
    return into;
  };
  const indexOfKey = (key: number, again: boolean, line: number): number => {
    const kind = keyReader.kind();
    // Kinds count differently, and a second pass is another hour: each has its own numbers in the map.
    const mark = key + (kind === "instant" ? 0.25 : 0) + (again ? 0.5 : 0);
    let index = indexOf.get(mark);
    if (index === undefined) {
      index = dates.keys.length;
      indexOf.set(mark, index);
      dates.keys.push(key);
      dates.kinds.push(kind);
      dates.lines.push(line);
      dates.rows.push(0);
      if (again) secondPasses.add(index);
    }
    return index;
  };

  return {
    row(cells, line) {
      const dateText = (cells[dateColumn] ?? "").trim();
      keyReader.at(line);
      const key = dateText === "" ? Number.NaN : keyReader.read(dateText);
      if (Number.isNaN(key)) {
        if (cells.every((cell) => cell.trim() === "")) return;
        read++;
        doubts.dateless(line, dateText, cells);
        return;
      }
      read++;
      doubts.dated();
      if (cells.length > width && cells.slice(width).some((cell) => cell.trim() !== "")) {
        doubts.tooWide(line, cells);
        return;
      }
      const into = wide ?? seriesOf(cells[seriesColumn ?? 0] ?? "");
      if (!into) {
        doubts.nameless(line, cells);
        return;
      }
      if (key !== lastKey || keyReader.mayRepeat()) {
        const again =
          keyReader.mayRepeat() &&
          isSecondPass(seriesColumn === null ? "" : (cells[seriesColumn] ?? ""), key, keyReader.moment());
        lastIndex = indexOfKey(key, again, line);
        lastKey = key;
      }
      dates.rows[lastIndex]++;
      const moment = keyReader.moment();
      for (let at = 0; at < columns.length; at++) {
        const text = cells[columns[at]];
        if (text === undefined || text === "") continue;
        let value: number;
        if (rule === "count") value = isMissing(text) ? Number.NaN : 1;
        else {
          value = parseNumber(text, style);
          if (Number.isNaN(value) && !isMissing(text)) doubts.badNumber(columns[at], line, copied(text));
        }
        if (!Number.isNaN(value)) addValue(into[at], lastIndex, value, rule, moment);
      }
    },
    collected: () => ({
      series,
      dates,
      read,
      hasValues: (column) =>
        series.some(({ used }, at) => used > 0 && columns[at % columns.length] === column),
    }),
  };
}
