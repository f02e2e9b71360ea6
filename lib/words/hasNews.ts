import { attentionTo, newsFrom } from "./attention.ts";
import type { RunFacts } from "./facts.ts";

/**
 * Whether a run has anything to tell someone who wants to hear only of change: a fresh change, a surprise, late
 * data, a limit more likely passed than not, a table that failed or was not reached, or an earlier note still owed.
 */
export function hasNews(run: RunFacts): boolean {
  return (
    run.failed.length > 0 ||
    run.left.length > 0 ||
    run.undelivered.length > 0 ||
    run.tables.some(
      (table) =>
        table.problems.some((problem) => problem.fatal) ||
        table.series.some((facts) => attentionTo(facts) >= newsFrom),
    )
  );
}
