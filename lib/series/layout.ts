import { emptyDateCell } from "./dateCell.ts";
import type { DateFormat } from "./dateFormat.ts";
import { decimalEvidence, isMissing } from "./numbers.ts";
import { createRowSplitter } from "./rows.ts";

export interface Row {
  readonly line: number;
  readonly cells: string[];
}

export interface Sample {
  readonly rows: readonly Row[];
  readonly comments: readonly { readonly line: number; readonly text: string }[];
  /** Line of a quote that never closes. */
  readonly unclosedQuote?: number;
}

/** The non-blank rows of a text. `whole` says that the text ends here rather than being cut off. */
export function sampleRows(text: string, delimiter: string, whole: boolean): Sample {
  const rows: Row[] = [];
  const comments: { line: number; text: string }[] = [];
  const splitter = createRowSplitter(delimiter, {
    row(cells, line) {
      if (cells.some((cell) => cell.trim() !== "")) rows.push({ line, cells });
    },
    comment: (comment, line) => void comments.push({ line, text: comment }),
  });
  splitter.push(text);
  // In a head cut off, a last row of half its length is no row.
  const { line, length } = splitter.pending();
  const { unclosedQuote } = whole
    ? splitter.end()
    : { unclosedQuote: length > text.length / 2 ? line : undefined };
  return { rows, comments, unclosedQuote };
}

const looksNumeric = (cell: string) => decimalEvidence(cell) !== "none";

/** What the cells of one column are. */
export interface ColumnCounts {
  readonly numbers: number;
  readonly missing: number;
  readonly texts: number;
}

export function countColumn(rows: readonly Row[], column: number): ColumnCounts {
  let numbers = 0;
  let missing = 0;
  for (const { cells } of rows) {
    const cell = cells[column] ?? "";
    if (isMissing(cell)) missing++;
    else if (looksNumeric(cell)) numbers++;
  }
  return { numbers, missing, texts: rows.length - numbers - missing };
}

/** Rows whose cell in a column is written in a format; counted no further once they cannot be more than `toBeat`. */
function countDates(rows: readonly Row[], column: number, format: DateFormat, toBeat: number): number {
  const cell = emptyDateCell();
  let missed = 0;
  for (const { cells } of rows) {
    const text = cells[column];
    if (text === undefined || text === "" || !format.read(text.trim(), cell)) missed++;
    if (rows.length - missed <= toBeat) break;
  }
  return rows.length - missed;
}

export interface DateColumn {
  readonly column: number;
  readonly format: DateFormat;
  readonly found: number;
}

/** The column and format that read as dates in most rows; `undefined` when fewer than half of the rows do. */
export function findDateColumn(
  rows: readonly Row[],
  formats: readonly DateFormat[],
  columns: readonly number[],
): DateColumn | undefined {
  let best: DateColumn | undefined;
  for (const column of columns) {
    for (const format of formats) {
      const toBeat = best?.found ?? 0;
      const found = countDates(rows, column, format, toBeat);
      if (found > toBeat) best = { column, format, found };
    }
  }
  return best;
}

const delimiters = [",", ";", "\t", "|"] as const;

/**
 * The delimiter under which most rows hold a date of an unmistakable format beside another cell; failing that, most
 * rows with two cells or more of which one is a number.
 */
export function findDelimiter(head: string, formats: readonly DateFormat[]): string {
  const clear = formats.filter((format) => !format.digitsOnly);
  let best: string = ",";
  let bestScore = 0;
  for (const delimiter of delimiters) {
    if (!head.includes(delimiter)) continue;
    const rows = sampleRows(head, delimiter, true).rows.filter(({ cells }) => cells.length > 1);
    if (rows.length === 0) continue;
    const width = Math.min(40, Math.max(...rows.map(({ cells }) => cells.length)));
    const dates = findDateColumn(rows, clear, [...Array(width).keys()])?.found ?? 0;
    const numbers = rows.filter(({ cells }) => cells.some(looksNumeric)).length;
    const score = dates * 4 + numbers + rows.length * 0.1;
    if (score > bestScore) {
      best = delimiter;
      bestScore = score;
    }
  }
  return best;
}
