import { dateFormats } from "./dateFormats.ts";
import { looksBinary } from "./decode.ts";
import type { Source } from "./describeReading.ts";
import { findDelimiter, sampleRows } from "./layout.ts";
import type { Complain } from "./problems.ts";
import { createRowSplitter, type RowSplitter } from "./rows.ts";
import { openSession, type Session } from "./session.ts";
import { TableFault } from "./tableFault.ts";
import { planTable } from "./tablePlan.ts";
import type { ReadContext, TableResult } from "./tableResult.ts";
import type { TableSettings } from "./tableSettings.ts";

/** Characters looked at before reading begins; a table shorter than this is looked at whole. */
const headLength = 400_000;
/** More is looked at, up to this, where the head leaves a doubt that later rows may settle. */
const longestHead = 8_000_000;
const settledByMore = new Set(["decimal-unclear", "no-values", "empty", "no-rows", "no-dates"]);
/** Of these, how many are enough to find the delimiter. */
const delimiterHead = 60_000;
/** Text goes to the splitter in pieces of this size, so that cells stay near in memory. */
const pieceLength = 1 << 16;

/** Reads the text of one table, given in pieces of any size. */
export interface TextReader {
  push(text: string): void;
  /** @throws TableFault when the table cannot be read */
  finish(source: Source): TableResult;
}

function refuseOtherTexts(head: string, complain: Complain): void {
  const start = head.slice(0, 500).trimStart();
  const refuse = (message: string, remedy: string) =>
    new TableFault(complain("not-a-table", true, message, remedy));
  if (start === "" && head.length < 500)
    throw new TableFault(
      complain(
        "empty",
        true,
        "the file is empty",
        "export it again: a line that names the columns, then rows of dates and numbers",
      ),
    );
  if (looksBinary(head)) throw refuse("the file holds no text", "save the table as CSV");
  if (/^<(?:!doctype|html|\?xml|[a-z]+[\s>])/i.test(start))
    throw refuse(
      "the file is a web page or XML, not a table",
      "save the table as CSV; perhaps a sign-in page was saved instead",
    );
  if (/^[{[]\s*["{[\]}]/.test(start)) throw refuse("the file is JSON, not a table", "save the table as CSV");
}

/** A row without an end: nearly always a quotation mark that was never closed. */
const endless = (line: number, text: string, complain: Complain) =>
  new TableFault(
    text.includes('"')
      ? complain(
          "quote-not-closed",
          true,
          "a quotation mark opens here and never closes",
          "close it, or take it away",
          {
            line,
          },
        )
      : complain("endless-line", true, "the line has no end", "see whether the file is a table at all", {
          line,
        }),
  );

export function createTextReader(
  settings: TableSettings,
  context: ReadContext,
  complain: Complain,
): TextReader {
  const locale = context.locale ?? "en-GB";
  /** What came before reading began. */
  let held = "";
  let enough = headLength;
  let session: Session | undefined;
  let splitter: RowSplitter | undefined;
  /** Old text files end their lines with a return alone. */
  let returnsOnly = false;

  const lines = (text: string) => (returnsOnly ? text.replaceAll("\r", "\n") : text);
  const feed = (into: RowSplitter, text: string) => {
    for (let at = 0; at < text.length; at += pieceLength) into.push(text.slice(at, at + pieceLength));
  };
  const begin = (head: string, whole: boolean) => {
    refuseOtherTexts(head, complain);
    returnsOnly = !head.includes("\n") && head.includes("\r");
    const text = lines(head);
    const delimiter = settings.delimiter ?? findDelimiter(text.slice(0, delimiterHead), dateFormats(locale));
    const sample = sampleRows(text, delimiter, whole);
    if (sample.unclosedQuote !== undefined) throw endless(sample.unclosedQuote, text, complain);
    const plan = planTable(sample, whole, delimiter, settings, locale, complain);
    const opened = openSession(plan, settings, context, complain);
    session = opened;
    splitter = createRowSplitter(delimiter, {
      row(cells, line) {
        if (line > plan.headerLine) opened.row(cells, line);
      },
      comment: () => undefined,
    });
  };
  /** Begins as soon as the head tells enough. */
  const tryToBegin = (ended: boolean) => {
    while (!splitter && (ended || held.length >= enough)) {
      try {
        begin(held.slice(0, enough), ended && held.length <= enough);
      } catch (error) {
        const isOpen = error instanceof TableFault && settledByMore.has(error.problem.code);
        if (!isOpen || enough >= longestHead || (ended && held.length <= enough)) throw error;
        enough *= 5;
      }
    }
    if (splitter && held !== "") {
      feed(splitter, lines(held));
      held = "";
    }
  };
  return {
    push(text) {
      if (splitter) feed(splitter, lines(text));
      else {
        held += text;
        tryToBegin(false);
      }
    },
    finish(source) {
      tryToBegin(true);
      const end = splitter?.end();
      if (end?.unclosedQuote !== undefined) throw endless(end.unclosedQuote, '"', complain);
      return (session as Session).finish(source);
    },
  };
}
