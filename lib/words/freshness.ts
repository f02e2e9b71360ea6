import { periodIndex, periodStart } from "../series/periods.ts";
import type { Finding, SeriesFacts } from "./facts.ts";

type ChangeFinding = Extract<Finding, { code: "change" }>;

/**
 * The first period that the run before this one could not know: the one that was not over at its instant. At the
 * latest the last period, for figures may come late; the first of the history when there was no run before.
 */
function firstNewPeriod({ comparison, history, lastPeriod, period }: SeriesFacts): string {
  if (!comparison) return history.start;
  const since = period === "hour" ? comparison.since : comparison.since.slice(0, 10);
  return periodStart(lastPeriod, period, Math.min(0, periodIndex(lastPeriod, period, since)));
}

/** Whether this run is the first to tell of a change; a change stays fresh for some time after. */
export function isToldFirst(finding: ChangeFinding, facts: SeriesFacts): boolean {
  return finding.fresh && finding.noticed >= firstNewPeriod(facts);
}

/** Whether this run is the first to tell of a change, or to tell that it is confirmed. */
export function isNewOrConfirmed(finding: ChangeFinding, facts: SeriesFacts): boolean {
  if (facts.findings.some((one) => one.code === "no-new-values")) return false;
  if (isToldFirst(finding, facts)) return true;
  const { monitor, period, lastPeriod } = facts;
  if (!finding.fresh || finding.status !== "confirmed" || !monitor) return false;
  const newLooks = periodIndex(firstNewPeriod(facts), period, lastPeriod) + 1;
  return monitor.looksUsed - finding.evidence.looksUsed < newLooks;
}
