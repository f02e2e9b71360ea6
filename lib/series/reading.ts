import type { Period } from "./series.ts";
import type { TableSettings } from "./tableSettings.ts";

export type CombineRule = NonNullable<TableSettings["combine"]>;

/** Whether values so combined are amounts, of which a total can be told, rather than levels (a stock, a price). */
export const addsUp = (rule: CombineRule): boolean => rule === "sum" || rule === "count";

/** What was taken for what when a table was read: plain JSON, stored with the model and told by `check`. */
export interface Reading {
  readonly format: "text" | "parquet";
  readonly compressed: boolean;
  readonly encoding: string | null;
  readonly delimiter: string | null;
  /** Line that names the columns, from 1; `null` where the format names them itself. */
  readonly headerLine: number | null;
  readonly columns: readonly {
    readonly name: string;
    readonly role: "date" | "period" | "series" | "value" | "ignored";
  }[];
  readonly date: {
    readonly column: string;
    /** As people would write it down, such as YYYY-MM-DD. */
    readonly format: string;
    readonly order: "day-first" | "month-first" | null;
    /** What told the order, when there is one. */
    readonly how: string | null;
  };
  readonly decimal: { readonly mark: "." | ","; readonly how: "set" | "found" | "usual" };
  readonly shape: "wide" | "long";
  readonly period: {
    readonly every: Period;
    readonly weekStartsOn: string | null;
    readonly how: "set" | "dates" | "format";
  };
  /** How several rows of one period became one value; `null` when no period had several. */
  readonly combine: { readonly rule: CombineRule; readonly how: "set" | "assumed" } | null;
  /** Start of the period that was not over at `asOf` and is left out; `null` when the table did not reach it. */
  readonly incompletePeriod: string | null;
  readonly rows: {
    readonly read: number;
    readonly used: number;
    /** Totals, notes and repeated headers, and rows with a problem. */
    readonly ignored: number;
    /** Rows of the incomplete period and after it. */
    readonly later: number;
  };
}
