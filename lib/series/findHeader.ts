import type { DateFormat } from "./dateFormat.ts";
import { findDateColumn, type Row } from "./layout.ts";
import { isMissing, parseNumber } from "./numbers.ts";
import { type Complain, quoted } from "./problems.ts";
import { TableFault } from "./tableFault.ts";
import type { TableSettings } from "./tableSettings.ts";

interface Header {
  readonly header: Row;
  /** The rows below it. */
  readonly data: readonly Row[];
}

const filled = ({ cells }: Row) => cells.filter((cell) => cell.trim() !== "").length;
const isNumber = (cell: string) => !Number.isNaN(parseNumber(cell, { decimal: "." }));
const unitCell = /^(?:[[(].*[\])]|eur|usd|gbp|chf|[\p{Sc}%]|°[cf]|mm|cm|km|kg|t|l|kwh|mwh|pcs|units?|n)?$/iu;

/** The fullest row above the data, the lowest of equals, unless that one only names units. */
function headerAbove(rows: readonly Row[]): Row | undefined {
  const most = Math.max(0, ...rows.map(filled));
  const full = rows.filter((row) => filled(row) === most && most > 1);
  const last = full.at(-1);
  const isUnits = last?.cells.slice(1).every((cell) => unitCell.test(cell.trim()));
  return isUnits && full.length > 1 ? full.at(-2) : last;
}

/** The row that holds all names the settings give. */
function rowNaming(rows: readonly Row[], settings: TableSettings): Row | undefined {
  const wanted = [settings.date, settings.seriesName, settings.period, settings.values]
    .flat()
    .filter((name) => typeof name === "string")
    .map((name) => name.trim().toLowerCase());
  if (wanted.length === 0) return undefined;
  return rows.slice(0, 100).find(({ cells }) => {
    const have = new Set(cells.map((cell) => cell.trim().toLowerCase()));
    return wanted.every((name) => have.has(name));
  });
}

/**
 * Finds the line that names the columns: the one the settings give or whose names they use; else the fullest row
 * above the first row with a date. Lines above it are titles. A comment may be the header, if nothing else is.
 *
 * @throws TableFault when data begin without a header
 */
export function findHeader(
  rows: readonly Row[],
  comments: readonly { readonly line: number; readonly text: string }[],
  delimiter: string,
  formats: readonly DateFormat[],
  settings: TableSettings,
  complain: Complain,
): Header {
  const below = (header: Row) => ({ header, data: rows.filter(({ line }) => line > header.line) });
  if (settings.headerLine !== undefined) {
    const row = rows.find(({ line }) => line === settings.headerLine);
    if (row) return below(row);
    throw new TableFault(
      complain(
        "no-header",
        true,
        `the settings say that line ${settings.headerLine} names the columns, but it is blank or not there`,
        "correct headerLine in the settings",
        { line: settings.headerLine },
      ),
    );
  }
  const naming = rowNaming(rows, settings);
  if (naming) return below(naming);
  const probe = rows.slice(0, 500);
  const width = Math.min(200, Math.max(...probe.map(({ cells }) => cells.length)));
  const columns = Array.from({ length: width }, (_, at) => at);
  const clear = findDateColumn(
    probe,
    formats.filter((format) => !format.digitsOnly),
    columns,
  );
  const isData = (row: Row): boolean => {
    if (!clear || clear.found < 0.3 * probe.length) {
      // No clear dates: data begin at the first row that is mostly numbers.
      const numbers = row.cells.filter(isNumber).length;
      const texts = row.cells.filter((cell) => !isNumber(cell) && !isMissing(cell)).length;
      return numbers > 0 && numbers >= texts;
    }
    return findDateColumn([row], [clear.format], [clear.column]) !== undefined;
  };
  const first = rows.find(isData);
  const above = first ? rows.filter(({ line }) => line < first.line) : rows.slice(0, 1);
  const header = headerAbove(above);
  if (header) return { header, data: first ? rows.filter(({ line }) => line >= first.line) : rows.slice(1) };
  const comment = comments
    .filter(({ line }) => !first || line < first.line)
    .map(({ line, text }) => ({ line, cells: text.replace(/^#+\s*/, "").split(delimiter) }))
    .filter(({ cells }) => cells.length === first?.cells.length && cells.length > 1)
    .at(-1);
  if (comment) return below(comment);
  throw new TableFault(
    complain(
      "no-header",
      true,
      `the table begins with data (${quoted(rows[0].cells.join(delimiter))}) and does not name its columns`,
      `add a first line such as ${["date", "value", "value 2", "value 3"].slice(0, Math.max(2, Math.min(4, rows[0].cells.length))).join(delimiter)}`,
      { line: rows[0].line },
    ),
  );
}
