import { isoDate } from "./civil.ts";
import { emptyDateCell } from "./dateCell.ts";
import { dateFormats } from "./dateFormats.ts";
import { findEncoding } from "./decode.ts";
import { findDelimiter, sampleRows } from "./layout.ts";
import { complainer, quoted } from "./problems.ts";
import type { Problem } from "./series.ts";

/** Something known to come or to have been: every day from `from` to `until`, ISO dates, both included. */
export interface KnownEvent {
  readonly name: string;
  readonly from: string;
  readonly until: string;
  /** The tables it bears on; all when `null`. */
  readonly tables: readonly string[] | null;
}

const roles = {
  date: /^(?:date|from|start|day)$/i,
  name: /^(?:name|event|what)$/i,
  until: /^(?:until|to|end)$/i,
  tables: /^tables?$/i,
};

/**
 * Reads `events/<name>.csv`: columns `date` and `name`, optional `until`, optional `tables` (several separated by
 * blanks; empty means all). Dates as ISO (2026-11-30), or written out (30 November 2026).
 */
export function readEvents(
  input: string | Uint8Array,
  name: string,
  locale = "en-GB",
): { events: KnownEvent[]; problems: Problem[] } {
  const complain = complainer(name);
  const text =
    typeof input === "string"
      ? input.replace(/^\uFEFF/, "")
      : new TextDecoder(findEncoding(input)).decode(input);
  const formats = dateFormats(locale).filter(({ name }) => name === "iso-date" || name === "month-name");
  const { rows } = sampleRows(text, findDelimiter(text, formats), true);
  const header = rows[0]?.cells.map((cell) => cell.trim()) ?? [];
  const at = (role: keyof typeof roles) => header.findIndex((cell) => roles[role].test(cell));
  const [dateAt, nameAt, untilAt, tablesAt] = [at("date"), at("name"), at("until"), at("tables")];
  if (dateAt < 0 || nameAt < 0)
    return {
      events: [],
      problems: [
        complain(
          "events-header",
          true,
          "the first line of an events file names its columns, and must name date and name",
          "begin the file with date,name or date,name,until,tables",
          { line: rows[0]?.line ?? 1 },
        ),
      ],
    };
  const cell = emptyDateCell();
  const dayOf = (cellText: string) =>
    formats.some((format) => format.read(cellText, cell)) && cell.grain === "day" ? cell.day : undefined;
  const events: KnownEvent[] = [];
  const problems: Problem[] = [];
  for (const { line, cells } of rows.slice(1)) {
    const get = (index: number) => (index < 0 ? "" : (cells[index] ?? "").trim());
    const from = dayOf(get(dateAt));
    const until = get(untilAt) === "" ? from : dayOf(get(untilAt));
    if (from === undefined || until === undefined) {
      const [column, value] = from === undefined ? [dateAt, get(dateAt)] : [untilAt, get(untilAt)];
      problems.push(
        complain(
          "bad-date",
          false,
          `${quoted(value)} is no date; the event is left out`,
          "write it as 2026-11-30",
          {
            line,
            column: header[column],
          },
        ),
      );
    } else if (until < from)
      problems.push(
        complain(
          "bad-date",
          false,
          "the event ends before it begins; it is left out",
          "exchange the two dates",
          { line },
        ),
      );
    else if (get(nameAt) === "")
      problems.push(complain("no-name", false, "the event has no name; it is left out", "name it", { line }));
    else
      events.push({
        name: get(nameAt),
        from: isoDate(from),
        until: isoDate(until),
        tables: get(tablesAt) === "" ? null : get(tablesAt).split(/[\s,;]+/),
      });
  }
  return { events, problems };
}
