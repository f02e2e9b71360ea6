import { newsFrom, ranked } from "./attention.ts";
import type { Finding, RunFacts, SeriesFacts } from "./facts.ts";
import { isToldFirst } from "./freshness.ts";
import { plainName } from "./plainText.ts";

/** How many of each sort of news a run holds. */
export function newsCounts(run: Pick<RunFacts, "tables" | "failed" | "gone" | "untold">) {
  const { untold = { steady: 0, news: 0 } } = run;
  const findings = run.tables.flatMap((table) => table.series.flatMap((facts) => facts.findings));
  const count = (test: (finding: Finding) => boolean) => findings.filter(test).length;
  const series = ranked(run);
  return {
    series: series.length + untold.steady + untold.news,
    steady: series.filter((one) => one.attention < newsFrom).length + untold.steady,
    changes: run.tables.reduce((sum, table) => sum + table.series.filter(isNew).length, 0),
    past: run.tables.reduce((sum, table) => sum + table.series.filter(isFoundInPast).length, 0),
    recent: run.tables.reduce((sum, table) => sum + table.series.filter(isRecent).length, 0),
    surprises: count((finding) => finding.code === "surprise"),
    late: count((finding) => finding.code === "stale"),
    failed: run.failed.filter((one) => !one.beside).length,
    gone: run.gone?.length ?? 0,
    beside: run.failed.filter((one) => one.beside).length,
  };
}

const changesOf = (facts: SeriesFacts) => facts.findings.filter((one) => one.code === "change");

/** Series with a change that is told for the first time, and was noticed in time; or was found only in looking back. */
const isNew = (facts: SeriesFacts) =>
  changesOf(facts).some((one) => isToldFirst(one, facts) && !one.lookedBack);
const isFoundInPast = (facts: SeriesFacts) =>
  changesOf(facts).some((one) => isToldFirst(one, facts)) && !isNew(facts);

/** Series whose fresh changes were all told before. */
const isRecent = (facts: SeriesFacts) =>
  changesOf(facts).some((one) => one.fresh) && !changesOf(facts).some((one) => isToldFirst(one, facts));

/** "loans: 1 new lasting change, 1 one-off surprise" or "12 tables: all steady". */
export function headline(run: RunFacts): string {
  const counts = newsCounts(run);
  const some = (count: number, one: string, many = `${one}s`) =>
    count === 0 ? [] : [`${count} ${count === 1 ? one : many}`];
  const news = [
    ...some(counts.changes, "new lasting change"),
    ...some(counts.past, "lasting change found in the past", "lasting changes found in the past"),
    ...some(counts.recent, "recent lasting change"),
    ...some(counts.surprises, "one-off surprise"),
    ...some(counts.late, "series late", "series late"),
    ...some(counts.failed, "table not read", "tables not read"),
    ...some(counts.gone, "table gone since the last run", "tables gone since the last run"),
    ...some(counts.beside, "file of events or settings not usable", "files of events or settings not usable"),
  ];
  const tables = run.tables.length + counts.failed;
  const only = run.tables[0]?.table ?? run.failed[0]?.table;
  // The one table there is has nothing to do with those that are gone.
  const one = only === undefined || counts.gone > 0 ? "1 table" : plainName(only);
  const steady = tables === 0 ? "none was read" : "nothing has changed";
  return `${tables === 1 ? one : `${tables} tables`}: ${news.length > 0 ? news.join(", ") : steady}`;
}
