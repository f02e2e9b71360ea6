import { gunzipSync } from "node:zlib";
import { buildSeries, findCalendar } from "./buildSeries.ts";
import { createCollector } from "./collect.ts";
import { emptyDateCell, type Grain } from "./dateCell.ts";
import { createDateKeys, findClockUse } from "./dateKeys.ts";
import { findEncoding, foreignFile, looksBinary } from "./decode.ts";
import { findOrder } from "./findOrder.ts";
import { weekdays } from "./periods.ts";
import { type Complain, complainer, quoted } from "./problems.ts";
import type { Reading } from "./reading.ts";
import { createRowSplitter } from "./rows.ts";
import type { Period, Problem, Series } from "./series.ts";
import { TableFault } from "./tableFault.ts";
import { planTable, type TablePlan } from "./tablePlan.ts";
import type { TableSettings } from "./tableSettings.ts";

export interface ReadContext {
  /** Now: the period that holds it is not over and is left out. */
  readonly asOf: Date | string;
  /** IANA zone of calendar days and of clock times without an offset; UTC unless given. */
  readonly timeZone?: string;
  /** Language of month names beside English; en-GB unless given. */
  readonly locale?: string;
  /** The table's name, for problems. */
  readonly table?: string;
}

export interface TableResult {
  readonly series: Series[];
  readonly problems: Problem[];
  /** `null` when the table could not be read at all. */
  readonly reading: Reading | null;
}

const headLength = 2_000_000;
const pieceLength = 1 << 16;

function decode(input: string | Uint8Array, settings: TableSettings, complain: Complain) {
  if (typeof input === "string")
    return { text: input.replace(/^\uFEFF/, ""), encoding: null, compressed: false };
  let bytes = input;
  const compressed = bytes[0] === 0x1f && bytes[1] === 0x8b;
  if (compressed) {
    try {
      bytes = gunzipSync(bytes);
    } catch (error) {
      throw new TableFault(
        complain(
          "bad-gzip",
          true,
          `the compressed file cannot be opened: ${(error as Error).message}`,
          "compress or upload it again",
        ),
      );
    }
  }
  const foreign = foreignFile(bytes);
  if (foreign)
    throw new TableFault(
      complain("not-text", true, `the file is ${foreign}, not a table of text`, "save it as CSV"),
    );
  const encoding = settings.encoding ?? findEncoding(bytes);
  const text = new TextDecoder(encoding).decode(bytes);
  return { text: text.endsWith("\u001a") ? text.slice(0, -1) : text, encoding, compressed };
}

const grains: readonly Grain[] = ["instant", "day", "week", "month", "quarter", "year"];

/** The period that the way of writing itself names, such as month for 2026-11. */
function statedPeriod(plan: TablePlan): Period | undefined {
  const cell = emptyDateCell();
  let finest = grains.length - 1;
  for (const { cells } of plan.sample)
    if (plan.dateFormat.read((cells[plan.dateColumn] ?? "").trim(), cell))
      finest = Math.min(finest, grains.indexOf(cell.grain));
  const grain = grains[finest];
  return grain === "instant" || grain === "day" ? undefined : grain;
}

const delimiterNames: Record<string, string> = { ",": "comma", ";": "semicolon", "\t": "tab", "|": "pipe" };

function readText(
  text: string,
  encoding: string | null,
  compressed: boolean,
  settings: TableSettings,
  context: ReadContext,
  table: string,
  complain: Complain,
): TableResult {
  const timeZone = settings.timeZone ?? context.timeZone ?? "UTC";
  const lines = text.includes("\n") ? text : text.replaceAll("\r", "\n");
  const plan = planTable(
    lines.slice(0, headLength),
    lines.length <= headLength,
    settings,
    context.locale ?? "en-GB",
    complain,
  );
  const column = plan.names[plan.dateColumn];
  const dateCells = plan.sample.map(({ line, cells }) => ({
    line,
    text: (cells[plan.dateColumn] ?? "").trim(),
  }));
  const found = settings.dateOrder
    ? { order: settings.dateOrder, how: "set" }
    : findOrder(dateCells, plan.dateFormat, column, complain);
  if (plan.dateFormat.name === "day-and-month" && !found)
    throw new TableFault(
      complain(
        "date-order-unclear",
        true,
        `${quoted(dateCells[0].text)} may have the day or the month first, and no date in the column tells which`,
        'say "dateOrder": "day-first" or "month-first" in the settings of this table',
        { line: dateCells[0].line, column },
      ),
    );
  const clock = findClockUse(
    dateCells.slice(0, 20_000).map((cell) => cell.text),
    plan.dateFormat,
    found?.order ?? null,
  );
  if (clock.resolution === undefined && !settings.every)
    throw new TableFault(
      complain(
        "no-period",
        true,
        "the rows are some hours apart, which is no period known here",
        'say "every": "day" (or longer) and "combine" in the settings of this table',
        { column },
      ),
    );
  const resolution = settings.every
    ? settings.every === "hour"
      ? "hour"
      : "day"
    : (clock.resolution ?? "day");
  const keys = createDateKeys(
    plan.dateFormat,
    found?.order ?? null,
    resolution,
    clock.midnightsOnly,
    timeZone,
  );
  const collector = createCollector(plan, keys, settings.combine, table, complain);
  const splitter = createRowSplitter(plan.delimiter, {
    row: (cells, line) => {
      if (line > plan.headerLine) collector.row(cells, line);
    },
    comment: () => undefined,
  });
  for (let at = 0; at < lines.length; at += pieceLength) splitter.push(lines.slice(at, at + pieceLength));
  const { unclosedQuote } = splitter.end();
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
  const collected = collector.finish();
  const calendar = findCalendar(collected, resolution, statedPeriod(plan), settings, complain);
  const built = buildSeries(collected, resolution, calendar, settings, context.asOf, timeZone, complain);
  const problems = [...collected.problems, ...built.problems];
  if (built.series.length === 0)
    problems.push(
      complain(
        "no-complete-period",
        true,
        "the table holds no value of a period that is over",
        "wait for the period to end, or look whether the dates lie in the future",
      ),
    );
  return {
    series: built.series,
    problems,
    reading: {
      format: "text",
      compressed,
      encoding,
      delimiter: delimiterNames[plan.delimiter],
      headerLine: plan.headerLine,
      columns: plan.names.map((name, at) => ({
        name,
        role:
          at === plan.dateColumn
            ? "date"
            : at === plan.seriesColumn
              ? "series"
              : plan.valueColumns.includes(at)
                ? "value"
                : "ignored",
      })),
      date: {
        column,
        format: plan.dateFormat.pattern,
        order: found?.order ?? null,
        how: found?.how ?? null,
      },
      decimal: { mark: plan.style.decimal, how: plan.decimalHow },
      shape: plan.seriesColumn === null ? "wide" : "long",
      period: {
        every: calendar.every,
        weekStartsOn: calendar.every === "week" ? weekdays[calendar.weekStart] : null,
        how: calendar.how,
      },
      combine: built.combine,
      incompletePeriod: built.incompletePeriod,
      rows: {
        read: collected.read,
        used: collected.used,
        ignored: collected.read - collected.used,
        later: built.laterKeys.size,
      },
    },
  };
}

/**
 * Reads a table of dates and numbers, as people's tills, booking systems and spreadsheets write them, into regular
 * series. Text or bytes (also gzip); what was taken for what stands in `reading`; what is wrong stands in `problems`
 * with line and remedy, and nothing is guessed where the table leaves a doubt. Periods without a value are `NaN`.
 * The period that holds `asOf`, and anything later, is left out.
 *
 * @example readTable("day,calls\n2026-11-28,35\n2026-11-29,66\n", {}, { asOf: "2026-11-30T06:00:00Z" }).series[0].values // [35, 66]
 */
export function readTable(
  input: string | Uint8Array,
  settings: TableSettings,
  context: ReadContext,
): TableResult {
  const table = context.table ?? "table";
  const complain = complainer(table);
  try {
    const { text, encoding, compressed } = decode(input, settings, complain);
    if (text.trim() === "")
      throw new TableFault(
        complain(
          "empty",
          true,
          "the file is empty",
          "export it again: a header line and rows of dates and numbers are needed",
        ),
      );
    if (looksBinary(text))
      throw new TableFault(complain("not-text", true, "the file is not a text", "save it as CSV"));
    return readText(text, encoding, compressed, settings, context, table, complain);
  } catch (error) {
    if (error instanceof TableFault) return { series: [], problems: [error.problem], reading: null };
    throw error;
  }
}
