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
const headLength = 2_000_000;
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

const unclosed = (line: number, complain: Complain) =>
  new TableFault(
    complain(
      "quote-not-closed",
      true,
      "a quotation mark opens here and never closes",
      "close it, or take it away",
      {
        line,
      },
    ),
  );

export function createTextReader(
  settings: TableSettings,
  context: ReadContext,
  complain: Complain,
): TextReader {
  let head = "";
  let ended = false;
  let session: Session | undefined;
  let splitter: RowSplitter | undefined;
  /** Old text files end their lines with a return alone. */
  let returnsOnly = false;

  const start = () => {
    refuseOtherTexts(head, complain);
    returnsOnly = !head.includes("\n") && head.includes("\r");
    if (returnsOnly) head = head.replaceAll("\r", "\n");
    const locale = context.locale ?? "en-GB";
    const delimiter = settings.delimiter ?? findDelimiter(head.slice(0, delimiterHead), dateFormats(locale));
    const sample = sampleRows(head, delimiter, ended);
    if (sample.unclosedQuote !== undefined) throw unclosed(sample.unclosedQuote, complain);
    const plan = planTable(sample, ended, delimiter, settings, locale, complain);
    const opened = openSession(plan, settings, context, complain);
    session = opened;
    splitter = createRowSplitter(delimiter, {
      row(cells, line) {
        if (line > plan.headerLine) opened.row(cells, line);
      },
      comment: () => undefined,
    });
    feed(splitter, head);
    head = "";
  };
  const feed = (into: RowSplitter, text: string) => {
    if (text.length <= pieceLength) into.push(text);
    else for (let at = 0; at < text.length; at += pieceLength) into.push(text.slice(at, at + pieceLength));
  };
  return {
    push(text) {
      if (splitter) feed(splitter, returnsOnly ? text.replaceAll("\r", "\n") : text);
      else {
        head += text;
        if (head.length >= headLength) start();
      }
    },
    finish(source) {
      ended = true;
      if (!session) start();
      const end = splitter?.end();
      if (end?.unclosedQuote !== undefined) throw unclosed(end.unclosedQuote, complain);
      return (session as Session).finish(source);
    },
  };
}
