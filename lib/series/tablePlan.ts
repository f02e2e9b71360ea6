import type { DateFormat } from "./dateFormats.ts";
import { dateFormats } from "./dateFormats.ts";
import { findDecimal } from "./findDecimal.ts";
import { findHeader } from "./findHeader.ts";
import { findShape } from "./findShape.ts";
import {
  type ColumnCounts,
  countColumn,
  findDateColumn,
  findDelimiter,
  type Row,
  sampleRows,
} from "./layout.ts";
import type { NumberStyle } from "./numbers.ts";
import { type Complain, nearestName, quoted } from "./problems.ts";
import type { Reading } from "./reading.ts";
import { TableFault } from "./tableFault.ts";
import type { TableSettings } from "./tableSettings.ts";

/** How a table is to be read: what its head showed and what the settings say. */
export interface TablePlan {
  readonly delimiter: string;
  readonly headerLine: number;
  readonly names: readonly string[];
  readonly dateColumn: number;
  readonly dateFormat: DateFormat;
  readonly seriesColumn: number | null;
  readonly valueColumns: readonly number[];
  readonly style: NumberStyle;
  readonly decimalHow: Reading["decimal"]["how"];
  /** Rows of data in the head, for what must be decided before all is read. */
  readonly sample: readonly Row[];
}

const dateWords =
  /\b(?:dates?|day|week|month|quarter|year|period|time(?:stamp)?|datetime|hour|ts|epoch|datum|tag|woche|kw|monat|quartal|jahr|zeit(?:punkt)?|fecha|d[ií]a|semana|mes|a[nñ]o|data|jour|mois|ann[eé]e|semaine|giorno|mese|anno|dato|dag|maand|jaar|m[aå]ned|[aå]r)\b/i;

/** A cell of the header as the name of a column or series. */
export const cleanName = (cell: string) => cell.replace(/[\p{Cc}\p{Cf}\s]+/gu, " ").trim();

function columnNamed(name: string, names: readonly string[], key: string, complain: Complain): number {
  const exact = names.indexOf(name.trim());
  if (exact >= 0) return exact;
  const folded = names.findIndex((one) => one.toLowerCase() === name.trim().toLowerCase());
  if (folded >= 0) return folded;
  const near = nearestName(name, names);
  throw new TableFault(
    complain(
      "no-such-column",
      true,
      `the settings name ${quoted(name)} under "${key}", but the table has no such column`,
      near ? `write ${quoted(near)}, or one of: ${names.join(", ")}` : `use one of: ${names.join(", ")}`,
      { column: name },
    ),
  );
}

function withoutDoubles(names: readonly string[]): string[] {
  const seen = new Map<string, number>();
  return names.map((name, at) => {
    const base = name === "" ? `column ${at + 1}` : name;
    const count = (seen.get(base) ?? 0) + 1;
    seen.set(base, count);
    return count === 1 ? base : `${base} (${count})`;
  });
}

/**
 * Decides from the head of a text how to read the whole. `whole` says that the head is all there is.
 *
 * @throws TableFault when the table has no readable shape
 */
export function planTable(
  head: string,
  whole: boolean,
  settings: TableSettings,
  locale: string,
  complain: Complain,
): TablePlan {
  const formats = dateFormats(locale);
  const delimiter =
    settings.delimiter ?? findDelimiter(head.slice(0, 100_000), whole && head.length <= 100_000, formats);
  const { rows, comments, unclosedQuote } = sampleRows(head, delimiter, whole);
  if (unclosedQuote !== undefined)
    throw new TableFault(
      complain(
        "quote-not-closed",
        true,
        "a quotation mark opens here and never closes",
        "close or remove it",
        {
          line: unclosedQuote,
        },
      ),
    );
  if (rows.length === 0)
    throw new TableFault(
      complain(
        "empty",
        true,
        "the table holds no rows",
        "export it again: a header line and rows of dates and numbers are needed",
      ),
    );
  if (rows.every(({ cells }) => cells.length < 2))
    throw new TableFault(
      complain(
        "one-column",
        true,
        "every row holds one cell only, where a date and a value are needed",
        "separate the columns by comma, semicolon, tab or |, or name the delimiter in the settings",
        { line: rows[0].line },
      ),
    );
  const { header, data } = findHeader(rows, comments, delimiter, formats, settings, complain);
  const names = withoutDoubles(header.cells.map(cleanName));
  const every = names.map((_, at) => at);
  const columns = settings.date === undefined ? every : [columnNamed(settings.date, names, "date", complain)];
  const trusted = columns.filter(
    (at) => settings.date !== undefined || dateWords.test(names[at].replaceAll("_", " ")),
  );
  const clear = formats.filter((format) => !format.digitsOnly);
  const probe = data.slice(0, 2000);
  const dates =
    [findDateColumn(probe, clear, columns), findDateColumn(probe, formats, trusted)]
      .filter((found) => found !== undefined && found.found >= 0.5 * probe.length)
      .sort((a, b) => (b?.found ?? 0) - (a?.found ?? 0))[0] ?? undefined;
  if (!dates) {
    const at = trusted[0] ?? columns[0];
    const example = data.find(({ cells }) => (cells[at] ?? "").trim() !== "");
    throw new TableFault(
      complain(
        "no-dates",
        true,
        example
          ? `no column holds dates; ${quoted(names[at])} holds ${quoted(example.cells[at])}, which is no date`
          : "no column holds dates",
        "write dates as 2026-11-30 (or 2026-W49, 2026-11, 2026-Q4), or name the date column in the settings",
        { line: example?.line, column: names[at] },
      ),
    );
  }
  const named =
    settings.values === undefined
      ? undefined
      : [settings.values].flat().map((name) => columnNamed(name, names, "values", complain));
  const others = every.filter((at) => at !== dates.column);
  const counts = new Map<number, ColumnCounts>(others.map((at) => [at, countColumn(probe, at)]));
  const seriesColumn =
    typeof settings.seriesName === "string"
      ? columnNamed(settings.seriesName, names, "seriesName", complain)
      : settings.seriesName === null
        ? null
        : findShape(data, dates, others, counts, named);
  const isNumeric = (at: number) => {
    const count = counts.get(at);
    return count !== undefined && count.numbers > 0 && count.numbers >= count.texts;
  };
  const valueColumns = named ?? others.filter((at) => at !== seriesColumn && isNumeric(at));
  if (valueColumns.length === 0 && settings.combine !== "count")
    throw new TableFault(
      complain(
        "no-values",
        true,
        `beside the dates in ${quoted(names[dates.column])} no column holds numbers`,
        "add a column of numbers, or set combine to count to count the rows",
      ),
    );
  const decimal = findDecimal(data, valueColumns, names, delimiter, settings, complain);
  return {
    delimiter,
    headerLine: header.line,
    names,
    dateColumn: dates.column,
    dateFormat: dates.format,
    seriesColumn,
    valueColumns,
    style: { decimal: decimal.mark },
    decimalHow: decimal.how,
    sample: data,
  };
}
