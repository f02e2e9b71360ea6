import { attentionTo, newsFrom } from "./attention.ts";
import type { RunFacts, SeriesFacts } from "./facts.ts";
import { isNewOrConfirmed } from "./freshness.ts";

/**
 * Whether a run has anything to tell someone who wants to hear only of change: a change that is new or newly
 * confirmed, a surprise, late
 * data, a limit more likely passed than not, a table that failed, was not reached or is gone, or an earlier note still
 * owed.
 */
export function hasNews(run: RunFacts): boolean {
  return (
    run.failed.length > 0 ||
    run.left.length > 0 ||
    (run.gone ?? []).length > 0 ||
    run.undelivered.length > 0 ||
    run.tables.some(
      (table) => table.problems.some((problem) => problem.fatal) || table.series.some(seriesHasNews),
    )
  );
}

/** Changes told before are no news, however fresh; everything else is judged by the attention it asks for. */
function seriesHasNews(facts: SeriesFacts): boolean {
  const others = facts.findings.filter((one) => one.code !== "change");
  return (
    attentionTo({ ...facts, findings: others }) >= newsFrom ||
    facts.findings.some((one) => one.code === "change" && isNewOrConfirmed(one, facts))
  );
}
