import type { Problem } from "../series/series.ts";
import type { GoneTable, RunFacts } from "./facts.ts";
import { plainName, plainText } from "./plainText.ts";

/** Where a problem is, what it is and what to do: "line 14, column date: …". */
export function problemText(problem: Problem): string {
  const place = [
    problem.line === undefined ? "" : `line ${problem.line}`,
    problem.column === undefined ? "" : `column ${plainName(problem.column, 30)}`,
  ].filter((one) => one !== "");
  const said = [plainText(problem.message, 200), plainText(problem.remedy, 200)]
    .map((one) => one.charAt(0).toUpperCase() + one.slice(1))
    .map((one) => (/[.!?…]$/.test(one) ? one : `${one}.`))
    .join(" ");
  return place.length > 0 ? `${place.join(", ")}: ${said}` : said;
}

/** What became of a table that failed, or of a file beside the tables. */
export function failureText({ beside, hasForecast }: RunFacts["failed"][number]): string {
  if (beside) return "could not be used";
  return hasForecast === false
    ? "not refitted; there is no forecast of it yet"
    : "not refitted; an earlier forecast stands as it was";
}

/** What went wrong, for the last lines of a note: one line a table, worst first. */
export function troubleLines(run: RunFacts, most = 4): string[] {
  const failed = run.failed.map((one) => {
    const worst = one.problems.find((problem) => problem.fatal) ?? one.problems[0];
    const why = worst ? ` ${problemText(worst)}` : "";
    return `${plainName(one.table)} ${one.beside ? "" : "was "}${failureText(one)}.${why}`;
  });
  const left =
    run.left.length > 0 ? [`Not reached in time: ${list(run.left)}; the retry goes on with them.`] : [];
  const noted = run.tables.flatMap(({ table, problems }) =>
    problems.length === 0
      ? []
      : [
          `${plainName(table)}: ${problemText(problems[0])}${problems.length > 1 ? ` (and ${problems.length - 1} more)` : ""}`,
        ],
  );
  const all = [...failed, ...left, ...goneLines(run), ...noted];
  return all.length <= most
    ? all
    : [...all.slice(0, most - 1), `… and ${all.length - most + 1} more problems in the report.`];
}

/** Tables that are there no more, in one line however many: a whole folder may have been renamed. */
export function goneLines({ gone = [] }: RunFacts): string[] {
  const said = (tables: readonly GoneTable[], one: string, many: string) => {
    if (tables.length === 0) return [];
    const names = tables.map(({ table }) => table);
    const what =
      tables.length === 1
        ? `The table "${plainName(names[0])}" of the last run is not there any more; ${one}`
        : `${tables.length} tables of the last run are not there any more (${list(names)}); ${many}`;
    return [`${what}. Nothing to do, if that is meant; a renamed table begins anew under its new name.`];
  };
  return [
    ...said(
      gone.filter((one) => one.hasForecast),
      "its last forecast stands as it was",
      "their last forecasts stand as they were",
    ),
    ...said(
      gone.filter((one) => !one.hasForecast),
      "there was no forecast of it",
      "there were no forecasts of them",
    ),
  ];
}

/** Up to three names and how many more. */
export function list(names: readonly string[]): string {
  const shown = names.slice(0, 3).map((name) => plainName(name, 40));
  return names.length > 3 ? `${shown.join(", ")} and ${names.length - 3} more` : shown.join(", ");
}

/** Earlier notes that never arrived and what became of their news. */
export function owedLines(run: RunFacts, written: (instant: string) => string): string[] {
  const times = [...new Set(run.undelivered.map((one) => one.asOf))];
  if (times.length === 0) return [];
  if (times.length === 1)
    return [`The note of ${written(times[0])} could not be delivered then, and comes with this one.`];
  return [
    `${times.length} earlier notes, the first of ${written(times[0])}, could not be delivered then, and come with this one.`,
  ];
}
