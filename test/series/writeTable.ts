import type { Period } from "../../lib/series/series.ts";

/** How a table is written: the choices a program or a person makes when exporting. */
export interface Dialect {
  readonly delimiter: "," | ";" | "\t" | "|";
  readonly decimal: "." | ",";
  readonly thousands: "" | "," | "." | " " | "'";
  readonly date: "iso" | "iso-slash" | "day-first" | "month-first" | "dotted" | "named";
  readonly quoteAll: boolean;
  readonly lineEnd: "\n" | "\r\n" | "\r";
  readonly currency: "" | "€ " | " kr" | "EUR ";
  readonly negative: "minus" | "parentheses" | "behind";
  readonly missing: "" | "NA" | "-" | "n/a";
  readonly titles: number;
  readonly blankLines: boolean;
  readonly total: boolean;
  readonly newestFirst: boolean;
  readonly encoding: "utf-8" | "utf-8-mark" | "utf-16le" | "utf-16be";
}

export interface Table {
  readonly period: Period;
  /** ISO dates of the periods. */
  readonly dates: readonly string[];
  readonly names: readonly string[];
  /** A column a name; decimal text such as "-1234.50", `null` for a gap. */
  readonly columns: readonly (readonly (string | null)[])[];
}

const monthNames = ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"];

function writeDate(iso: string, style: Dialect["date"]): string {
  const [year, month, day] = iso.split("-");
  switch (style) {
    case "iso":
      return iso;
    case "iso-slash":
      return `${year}/${Number(month)}/${Number(day)}`;
    case "day-first":
      return `${day}/${month}/${year}`;
    case "month-first":
      return `${month}/${day}/${year}`;
    case "dotted":
      return `${Number(day)}.${Number(month)}.${year}`;
    case "named":
      return `${Number(day)} ${monthNames[Number(month) - 1]} ${year}`;
  }
}

function writeNumber(text: string, dialect: Dialect): string {
  const isNegative = text.startsWith("-");
  const [whole, fraction] = text.replace("-", "").split(".");
  const grouped = whole.replace(/\B(?=(?:\d{3})+$)/g, dialect.thousands);
  const digits = `${grouped}${fraction === undefined ? "" : `${dialect.decimal}${fraction}`}`;
  const { currency } = dialect;
  const amount = currency.startsWith(" ") ? `${digits}${currency}` : `${currency}${digits}`;
  if (!isNegative) return amount;
  if (dialect.negative === "parentheses") return `(${amount})`;
  return dialect.negative === "behind" && currency === "" ? `${digits}-` : `-${amount}`;
}

function writeCell(text: string, { delimiter, quoteAll }: Dialect): string {
  return quoteAll || text.includes(delimiter) || /["\r\n]/.test(text)
    ? `"${text.replaceAll('"', '""')}"`
    : text;
}

/** Writes a table in a dialect, independently of the reader. */
export function writeTable(table: Table, dialect: Dialect): Uint8Array {
  const line = (cells: readonly string[]) =>
    cells.map((cell) => writeCell(cell, dialect)).join(dialect.delimiter);
  const rows = table.dates.map((date, at) =>
    line([
      writeDate(date, dialect.date),
      ...table.columns.map((column) => {
        const value = column[at];
        return value === null ? dialect.missing : writeNumber(value, dialect);
      }),
    ]),
  );
  if (dialect.newestFirst) rows.reverse();
  const titles = Array.from({ length: dialect.titles }, (_, at) =>
    line([`Report ${at + 1}`, ...table.names.slice(1).map(() => "")]),
  );
  const total = dialect.total ? [line(["Total", ...table.names.map(() => "1")])] : [];
  const lines = [...titles, line(["date", ...table.names]), ...rows, ...total];
  const text =
    lines.join(dialect.blankLines ? dialect.lineEnd + dialect.lineEnd : dialect.lineEnd) + dialect.lineEnd;
  switch (dialect.encoding) {
    case "utf-8":
      return new Uint8Array(Buffer.from(text));
    case "utf-8-mark":
      return new Uint8Array(Buffer.from(`\uFEFF${text}`));
    case "utf-16le":
      return new Uint8Array(Buffer.from(`\uFEFF${text}`, "utf16le"));
    case "utf-16be":
      return new Uint8Array(Buffer.from(`\uFEFF${text}`, "utf16le").swap16());
  }
}
