import { columnNamed, columnNames, speaksOfDates } from "./columnNames.ts";
import type { DateFormat } from "./dateFormat.ts";
import { dateFormats } from "./dateFormats.ts";
import { findDecimal } from "./findDecimal.ts";
import { findHeader } from "./findHeader.ts";
import { findShape } from "./findShape.ts";
import {
  type ColumnCounts,
  countColumn,
  type DateColumn,
  findDateColumn,
  type Row,
  type Sample,
} from "./layout.ts";
import type { NumberStyle } from "./numbers.ts";
import { spellsPartOfDate } from "./partsOfDate.ts";
import { periodLabels } from "./periodLabels.ts";
import { type Complain, quoted } from "./problems.ts";
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

/** A column that only counts its rows, as data frames write one beside their data. */
function countsRows(data: readonly Row[], column: number, name: string): boolean {
  if (!/^(?:column \d+|unnamed: ?\d+|index|row|#)$/i.test(name) || data.length < 3) return false;
  const first = Number(data[0].cells[column]);
  return data.every(
    ({ cells }, at) => (cells[column] ?? "").trim() !== "" && Number(cells[column]) === first + at,
  );
}

function findDates(
  data: readonly Row[],
  names: readonly string[],
  formats: readonly DateFormat[],
  settings: TableSettings,
  complain: Complain,
): DateColumn {
  const setting = settings.period === undefined ? "date" : "period";
  const chosen = settings.period ?? settings.date;
  const columns = chosen === undefined ? [...names.keys()] : [columnNamed(chosen, names, setting, complain)];
  const trusted = columns.filter((at) => chosen !== undefined || speaksOfDates(names[at]));
  const clear = formats.filter((format) => !format.digitsOnly);
  const probe = data.slice(0, 2000);
  const enough = (found: DateColumn | undefined) =>
    found !== undefined && found.found >= 0.5 * probe.length ? found : undefined;
  const found =
    settings.period === undefined
      ? (enough(findDateColumn(probe, clear, columns)) ?? enough(findDateColumn(probe, formats, trusted)))
      : enough(findDateColumn(probe, [periodLabels(settings.every ?? "month")], columns));
  if (found) return found;
  const at = trusted[0] ?? columns[0];
  const example = data.find(({ cells }) => (cells[at] ?? "").trim() !== "");
  const what = setting === "period" ? "a year and the number of a period, such as 2026-P03" : "a date";
  throw new TableFault(
    complain(
      setting === "period" ? "no-periods" : "no-dates",
      true,
      example
        ? `${chosen === undefined ? "no column holds dates; " : ""}${quoted(names[at])} holds ${quoted(example.cells[at])}, which cannot be read as ${what}`
        : "no column holds dates",
      "write dates as 2026-11-30 (or 2026-W49, 2026-11, 2026-Q4), or name the column of dates under date in the settings",
      { line: example?.line, column: names[at] },
    ),
  );
}

/**
 * Decides from the first rows of a table how to read the whole. `whole` says that the sample is all there is.
 *
 * @throws TableFault when the table has no readable shape
 */
export function planTable(
  { rows, comments }: Sample,
  whole: boolean,
  delimiter: string,
  settings: TableSettings,
  locale: string,
  complain: Complain,
): TablePlan {
  if (rows.length === 0)
    throw new TableFault(
      complain("empty", true, "the file holds only blank lines and comments", "export the table again"),
    );
  if (settings.combine !== "count" && rows.every(({ cells }) => cells.length < 2))
    throw new TableFault(
      complain(
        "one-column",
        true,
        "every row has one cell only, where a date and a value are needed",
        "separate the cells by comma, semicolon, tab or |, or name the delimiter in the settings",
        { line: rows[0].line },
      ),
    );
  const formats = dateFormats(locale);
  const { header, data } = findHeader(rows, comments, delimiter, formats, settings, complain);
  const names = columnNames(header.cells);
  if (data.length === 0)
    throw new TableFault(
      complain(
        "no-rows",
        true,
        "below the line that names the columns there are no rows",
        "export the table again",
        {
          line: header.line,
        },
      ),
    );
  const dates = findDates(data, names, formats, settings, complain);
  const named =
    settings.values === undefined
      ? undefined
      : [settings.values].flat().map((name) => columnNamed(name, names, "values", complain));
  const others = [...names.keys()].filter((at) => at !== dates.column);
  const counts = new Map<number, ColumnCounts>(others.map((at) => [at, countColumn(data, at)]));
  const seriesColumn =
    typeof settings.seriesName === "string"
      ? columnNamed(settings.seriesName, names, "seriesName", complain)
      : settings.seriesName === null
        ? null
        : findShape(data, dates, others, counts, named);
  const holdsNumbers = (at: number) => {
    const { numbers, texts } = counts.get(at) ?? { numbers: 0, texts: 0 };
    // A column that is still empty may begin later, while there is more to read.
    return (numbers > 0 || (!whole && texts === 0)) && 3 * numbers >= texts;
  };
  const numeric = others.filter(
    (at) => at !== seriesColumn && holdsNumbers(at) && !countsRows(data, at, names[at]),
  );
  const measured = numeric.filter((at) => !spellsPartOfDate(data, at, names[at], dates));
  const valueColumns = named ?? (measured.length > 0 ? measured : numeric);
  if (valueColumns.length === 0 && settings.combine !== "count") {
    const text = others.find((at) => at !== seriesColumn && (counts.get(at)?.texts ?? 0) > 0);
    const example =
      text === undefined ? undefined : data.find(({ cells }) => (cells[text] ?? "").trim() !== "");
    throw new TableFault(
      complain(
        "no-values",
        true,
        example && text !== undefined
          ? `beside the dates no column holds numbers; ${quoted(names[text])} holds ${quoted(example.cells[text])}`
          : "beside the dates no column holds numbers",
        "add a column of numbers, or set combine to count to count the rows of each period",
        example && text !== undefined ? { line: example.line, column: names[text] } : {},
      ),
    );
  }
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
