import { weekdays } from "../series/periods.ts";
import { addsUp, type Reading } from "../series/reading.ts";
import type { Period, Problem } from "../series/series.ts";
import { periodNames } from "../words/periods.ts";
import type { CheckedSeries, CheckedTable, CheckReport } from "./check.ts";
import { noTablesText } from "./noTables.ts";

const count = (number: number, one: string, many = `${one}s`) => `${number} ${number === 1 ? one : many}`;

/** "a, b and 3 more" */
function listed(names: readonly string[], most = 6): string {
  if (names.length <= most) {
    const [last, ...first] = [...names].reverse();
    return first.length === 0 ? last : `${first.reverse().join(", ")} and ${last}`;
  }
  return `${names.slice(0, most - 1).join(", ")} and ${names.length - most + 1} more`;
}

function problemLine({ line, column, message, remedy }: Problem): string {
  const place = [line === undefined ? "" : `line ${line}`, column === undefined ? "" : `column "${column}"`]
    .filter((part) => part !== "")
    .join(", ");
  return `${place === "" ? "" : `${place}: `}${message.replace(/^settings\.json: /, "")} → ${remedy}`;
}

const adjectives: Record<Period, string> = {
  hour: "hourly",
  day: "daily",
  week: "weekly",
  month: "monthly",
  quarter: "quarterly",
  year: "yearly",
};

const capital = (word: string) => `${word[0].toUpperCase()}${word.slice(1)}`;

/** How the table was read, in one line: what a person would correct in the settings if it is wrong. */
function readingLine({
  format,
  delimiter,
  headerLine,
  date,
  decimal,
  period,
  combine,
  columns,
}: Reading): string {
  const ignored = columns.filter(({ role }) => role === "ignored").map(({ name }) => `"${name}"`);
  const parts = [
    format === "parquet" ? "a Parquet file" : `${delimiter}s between cells`,
    headerLine !== null && headerLine > 1 ? `columns named in line ${headerLine}` : "",
    `dates in "${date.column}" written ${date.format}${date.order && date.how !== "set" ? ` (told by ${date.how})` : ""}`,
    format === "parquet" ? "" : `decimal ${decimal.mark === "." ? "point" : "comma"}`,
    period.weekStartsOn ? `weeks begin on ${capital(period.weekStartsOn)}` : "",
    combine
      ? `several rows of a ${period.every} make one value: ${combine.rule}${combine.how === "assumed" ? ", as nothing was said" : ""}`
      : "",
    ignored.length > 0 ? `left out: ${listed(ignored)}` : "",
  ];
  return `read as: ${parts.filter((part) => part !== "").join("; ")}`;
}

/** A weekday counted from Sunday, as dates count them. */
const weekday = (day: number) => capital(weekdays[(day + 6) % 7]);

function seriesLines({ series, reading }: CheckedTable, report: CheckReport): string[] {
  const { period } = series[0];
  const names = periodNames(period, report.locale, report.timeZone, report.asOf);
  const first = series.map((one) => one.start).sort()[0];
  const last = series.map((one) => one.lastPeriod).sort()[series.length - 1];
  const lines = [
    `${series.length} ${adjectives[period]} series (${listed(series.map((one) => one.name))}), from ${names.inText(first)} to ${names.inText(last)}`,
  ];
  const gapWords = ({ name, gaps, latestGap }: CheckedSeries) =>
    `${name} has ${gaps}${latestGap ? `, the latest ${names.when(latestGap)}` : ""}`;
  const gappy = series.filter((one) => one.gaps > 0);
  if (gappy.length > 0) lines.push(`gaps: ${listed(gappy.map(gapWords), 4)}`);
  const closed = [...new Set(gappy.flatMap((one) => one.closedDays))].sort();
  // A stock or a price has no zero on a day without a row.
  if (
    addsUp(reading?.combine?.rule ?? "sum") &&
    closed.length > 0 &&
    gappy.every((one) => one.closedDays.length > 0)
  )
    lines.push(
      `hardly any ${closed.map(weekday).join(" or ")} has a value: if those days count as nothing (nothing sold, no calls), say "emptyMeans": "zero" in the settings of this table; all gaps count as nothing then`,
    );
  const late = series.filter((one) => one.periodsLate > 0);
  if (late.length > 0) {
    const most = Math.max(...late.map((one) => one.periodsLate));
    const who = late.length === series.length ? "the table" : listed(late.map((one) => one.name));
    lines.push(
      `${who} is behind: ${most === 1 ? `one ${period} that is over has` : `${late.length > 1 ? "up to " : ""}${most} ${period}s that are over have`} no value yet`,
    );
  }
  const running = reading?.incompletePeriod;
  if (running) lines.push(`${capital(names.inText(running))} is not over yet and is left out`);
  return lines;
}

function howMany(readable: number, all: number): string {
  if (readable < all) return `${readable} of ${count(all, "table")}`;
  return all === 1 ? "The one table" : `All ${all} tables`;
}

/** The report of `check` in sentences, a line each. */
export function describeCheck(report: CheckReport): string[] {
  const lines: string[] = [];
  const readable = report.tables.filter((table) => table.readable).length;
  if (report.tables.length === 0) lines.push(noTablesText(report.address));
  else lines.push(`${howMany(readable, report.tables.length)} in ${report.address} can be read.`);
  if (report.settings.problems.length > 0)
    lines.push(
      "",
      "settings.json",
      ...report.settings.problems.map((problem) => `  ${problemLine(problem)}`),
    );
  for (const table of report.tables) {
    lines.push("", `${table.table}${table.readable ? "" : " cannot be read"}`);
    lines.push(...table.problems.map((problem) => `  ${problemLine(problem)}`));
    if (table.series.length > 0) lines.push(...seriesLines(table, report).map((line) => `  ${line}`));
    if (table.reading) lines.push(`  ${readingLine(table.reading)}`);
  }
  for (const { file, events, problems } of report.events)
    lines.push(
      "",
      `${file}: ${count(events, "event")}`,
      ...problems.map((problem) => `  ${problemLine(problem)}`),
    );
  if (report.otherFiles.length > 0)
    lines.push("", `not read, as the ending is not known: ${listed(report.otherFiles)}`);
  return lines;
}
