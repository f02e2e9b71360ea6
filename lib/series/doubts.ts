import { type Complain, quoted } from "./problems.ts";
import type { Problem } from "./series.ts";
import type { TablePlan } from "./tablePlan.ts";

/** A kind of trouble: where it was met first, and how often. */
interface Doubt {
  count: number;
  readonly line: number;
  readonly text: string;
}

/** Keeps count of rows and cells that could not be used, so that each kind becomes one problem. */
export interface Doubts {
  dateless(line: number, text: string, row: readonly string[]): void;
  /** A row with a date came: rows without one before it were not closing lines. */
  dated(): void;
  tooWide(line: number, row: readonly string[]): void;
  nameless(line: number, row: readonly string[]): void;
  badNumber(column: number, line: number, text: string): void;
  /** The problems. Of a column that no one named and that never held a number, words are no trouble. */
  problems(collected: { readonly read: number; readonly isSilent: (column: number) => boolean }): Problem[];
}

const summaryWords =
  /^(?:(?:grand |sub-?)?totals?|sums?|average|avg|mean|median|count|min|max|std|gesamt\w*|summe|durchschnitt|mittelwert|total(?:e|es)?|somme|moyenne|suma|media|promedio|soma|m[eé]dia|totaal|som|gemiddeld\w*|note|source|quelle|fuente|fonte|hinweis)\b/i;

/** Rows after the last date that may be totals, sources and notes. */
const mostClosing = 12;

const again = (doubt: Doubt | undefined, line: number, text: string): Doubt => {
  if (!doubt) return { count: 1, line, text };
  doubt.count++;
  return doubt;
};

const others = ({ count }: Doubt, one: string, many = `${one}s`) =>
  count === 1 ? "" : ` (and ${count - 1} more ${count === 2 ? one : many})`;

export function createDoubts(plan: TablePlan, complain: Complain): Doubts {
  const { names, dateColumn, seriesColumn, delimiter, dateFormat, style } = plan;
  let waiting: { line: number; text: string }[] = [];
  let begun = false;
  let badDate: Doubt | undefined;
  let tooWide: Doubt | undefined;
  let nameless: Doubt | undefined;
  const badNumbers = new Map<number, Doubt>();
  const isHeader = (row: readonly string[]) => row.every((cell, at) => cell.trim() === (names[at] ?? ""));
  const decimalName = style.decimal === "." ? "point" : "comma";
  return {
    dateless(line, text, row) {
      if (summaryWords.test(text) || isHeader(row)) return;
      const couldBeNote = text === "" || !/\d/.test(text) || /^[#*(]/.test(text);
      if (couldBeNote && waiting.length < mostClosing) waiting.push({ line, text });
      else badDate = again(badDate, line, text);
    },
    dated() {
      // What stands above the first date are units and remarks.
      const isFirst = !begun;
      begun = true;
      if (waiting.length === 0) return;
      if (!isFirst) for (const { line, text } of waiting) badDate = again(badDate, line, text);
      waiting = [];
    },
    tooWide(line, row) {
      tooWide = again(tooWide, line, row.join(delimiter));
    },
    nameless(line, row) {
      nameless = again(nameless, line, row.join(delimiter));
    },
    badNumber(column, line, text) {
      badNumbers.set(column, again(badNumbers.get(column), line, text));
    },
    problems({ read, isSilent }) {
      const problems: Problem[] = [];
      if (badDate)
        problems.push(
          complain(
            "bad-date",
            badDate.count > 0.5 * read,
            `${badDate.text === "" ? "the date is missing" : `${quoted(badDate.text)} is no date (the others are written ${dateFormat.pattern})`}; the row is left out${others(badDate, "row like it", "rows like it")}`,
            badDate.text === "" ? "fill in the date" : "correct the date",
            { line: badDate.line, column: names[dateColumn] },
          ),
        );
      if (tooWide)
        problems.push(
          complain(
            "too-many-cells",
            tooWide.count > 0.5 * read,
            `${quoted(tooWide.text)} has more cells than the line that names the columns; the row is left out${others(tooWide, "row like it", "rows like it")}`,
            `put a cell that holds a ${delimiter === "," ? "comma, such as 1,234," : "delimiter"} in quotation marks`,
            { line: tooWide.line },
          ),
        );
      if (nameless)
        problems.push(
          complain(
            "no-name",
            false,
            `the row does not say which series it belongs to, and is left out${others(nameless, "row like it", "rows like it")}`,
            `fill in ${quoted(names[seriesColumn ?? 0])}`,
            { line: nameless.line, column: names[seriesColumn ?? 0] },
          ),
        );
      for (const [column, doubt] of badNumbers)
        if (!isSilent(column))
          problems.push(
            complain(
              "bad-number",
              false,
              `${quoted(doubt.text)} is no number with a decimal ${decimalName}; it counts as a gap${others(doubt, "cell like it", "cells like it")}`,
              "correct it, or leave the cell empty when the value is not known",
              { line: doubt.line, column: names[column] },
            ),
          );
      return problems;
    },
  };
}
