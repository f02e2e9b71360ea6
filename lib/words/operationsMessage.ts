import { ranked } from "./attention.ts";
import type { RunFacts, Voice } from "./facts.ts";
import { headline, newsCounts } from "./headline.ts";
import { reportPlace, timeWriter } from "./instants.ts";
import { messageData } from "./messageData.ts";
import { footerOf, type Note } from "./note.ts";
import { numberWriter } from "./numbers.ts";
import { plainName } from "./plainText.ts";
import { countOf } from "./spans.ts";
import { nameInTable } from "./tableBefore.ts";
import { goneLines, list, problemText } from "./troubleLines.ts";

/** For those who run the job: what was done, what was not, and what to look at. */
export function operationsMessage(
  run: RunFacts & { readonly durationMilliseconds?: number },
  voice: Voice,
): Note {
  const counts = newsCounts(run);
  const write = numberWriter(voice.locale);
  const time = timeWriter(voice);
  const took =
    run.durationMilliseconds === undefined
      ? ""
      : ` in ${write(run.durationMilliseconds / 1000, run.durationMilliseconds < 10_000 ? 0.1 : 1)} s`;
  const late = ranked(run).filter((one) => one.facts.findings.some((finding) => finding.code === "stale"));
  const noted = run.tables.filter((one) => one.problems.length > 0);
  const failures = run.failed
    .slice(0, 8)
    .flatMap(({ table, problems }) => [
      `Failed: ${plainName(table)}. ${problems[0] ? problemText(problems[0]) : "No reason was recorded."}`,
    ]);
  const gone = goneLines(run);
  return {
    title: `${run.failed.length + run.left.length + gone.length + run.undelivered.length > 0 ? "Needs a look" : "All done"}: run of ${time(run.asOf)}`,
    lines: [
      `Refitted ${countOf(run.tables.length, "table", write)} with ${write(counts.series, 1)} series${took}; ${countOf(run.failed.length, "table", write)} failed, ${write(run.left.length, 1)} not reached.`,
      `News: ${headline(run)}.`,
      ...failures,
      ...(run.failed.length > 8 ? [`… and ${run.failed.length - 8} more failed.`] : []),
      ...(run.left.length > 0
        ? [
            `Not reached before time ran out: ${list(run.left)}. Running again with the same time goes on with them.`,
          ]
        : []),
      ...gone,
      ...(late.length > 0
        ? [
            `Late: ${list(late.map(({ table, facts }) => nameInTable(table.table, facts.series, facts.series, 120)))}.`,
          ]
        : []),
      ...(noted.length > 0
        ? [
            `Problems noted in ${countOf(noted.length, "table", write)}: ${list(noted.map((one) => one.table))}.`,
          ]
        : []),
      ...run.undelivered
        .slice(0, 5)
        .map((one) => `Undelivered: the note of ${time(one.asOf)} to ${plainName(one.webhook)}.`),
      ...(run.undelivered.length > 5 ? [`… and ${run.undelivered.length - 5} more undelivered.`] : []),
    ],
    footer: footerOf(reportPlace(run.asOf, voice)),
    data: messageData(run, "operations", ranked(run)),
  };
}
