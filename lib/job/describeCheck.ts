import type { Reading } from "../series/reading.ts";
import type { Problem } from "../series/series.ts";
import { periodNames } from "../words/periods.ts";
import type { CheckedSeries, CheckedTable, CheckReport } from "./check.ts";

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
  return `${place === "" ? "" : `${place}: `}${message}. → ${remedy}`;
}

const calendarWords: Record<string, string> = {
  hour: "hourly",
  day: "daily",
  week: "weekly",
  month: "monthly",
  quarter: "quarterly",
  year: "yearly",
};

/** How the table was read, in one line. */
function readingLine(reading: Reading): string {
  const parts = [
    reading.format === "parquet" ? "a Parquet file" : `${reading.delimiter ?? "text"} separated`,
    reading.headerLine !== null && reading.headerLine > 1
      ? `columns named in line ${reading.headerLine}`
      : "",
    `dates in "${reading.date.column}" written ${reading.date.format}`,
    reading.date.order ? `${reading.date.order} (${reading.date.how})` : "",
    `decimal ${reading.decimal.mark === "." ? "point" : "comma"}`,
    reading.period.weekStartsOn
      ? `weeks begin on ${reading.period.weekStartsOn[0].toUpperCase()}${reading.period.weekStartsOn.slice(1)}`
      : "",
    reading.combine
      ? `several rows of a period: ${reading.combine.rule}${reading.combine.how === "assumed" ? " (assumed)" : ""}`
      : "",
  ];
  const ignored = reading.columns.filter(({ role }) => role === "ignored").map(({ name }) => `"${name}"`);
  if (ignored.length > 0) parts.push(`left out: ${listed(ignored)}`);
  return `read as: ${parts.filter((part) => part !== "").join("; ")}`;
}

function seriesLines(table: CheckedTable, report: CheckReport): string[] {
  const { series } = table;
  const names = periodNames(series[0].period, report.locale, report.timeZone, report.asOf);
  const first = series.map((one) => one.start).sort()[0];
  const last =
    series
      .map((one) => one.lastPeriod)
      .sort()
      .at(-1) ?? first;
  const lines = [
    `${count(series.length, `${calendarWords[series[0].period]} series`, `${calendarWords[series[0].period]} series`)} (${listed(series.map((one) => one.name))}), from ${names.inText(first)} to ${names.inText(last)}`,
  ];
  const gappy = series.filter((one) => one.gaps > 0);
  const gapWords = ({ name, gaps, latestGap }: CheckedSeries) =>
    `${name} ${count(gaps, "gap")}${latestGap ? `, the latest ${names.when(latestGap)}` : ""}`;
  if (gappy.length > 0) lines.push(`gaps: ${listed(gappy.map(gapWords))}`);
  const late = series.filter((one) => one.periodsLate > 0);
  if (late.length > 0) {
    const most = Math.max(...late.map((one) => one.periodsLate));
    lines.push(
      `${late.length === series.length ? "the table" : listed(late.map((one) => one.name))} is behind: ${count(most, "complete period")} without a value by now`,
    );
  }
  const running = table.reading?.incompletePeriod;
  if (running) lines.push(`${names.inText(running)} is not over yet and is left out`);
  return lines;
}

/** The report of `check` in sentences, a line each. */
export function describeCheck(report: CheckReport): string[] {
  const lines: string[] = [];
  const readable = report.tables.filter((table) => table.readable).length;
  if (report.tables.length === 0)
    lines.push(
      `There are no tables in ${report.address} yet: put CSV files under series/, such as series/loans.csv.`,
    );
  else
    lines.push(
      `${readable === report.tables.length ? `All ${count(readable, "table")}` : `${readable} of ${count(report.tables.length, "table")}`} in ${report.address} can be read.`,
    );
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
  if (report.otherFiles.length > 0) lines.push("", `not read, being no tables: ${listed(report.otherFiles)}`);
  return lines;
}
