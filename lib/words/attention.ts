import type { Finding, RunFacts, SeriesFacts, TableFacts } from "./facts.ts";
import { isToldFirst } from "./freshness.ts";

/** One series with the table it stands in and how much it asks for attention. */
export interface Ranked {
  readonly table: TableFacts;
  readonly facts: SeriesFacts;
  readonly attention: number;
}

/** A chance of passing a limit from which it is news. */
const likely = 0.5;

const weights: { readonly [code in Finding["code"]]: (finding: Finding) => number } = {
  change: (finding) =>
    finding.code === "change" && finding.fresh
      ? (finding.status === "confirmed" ? 120 : 100) + excess(finding)
      : 0,
  stale: () => 60,
  surprise: (finding) => (finding.code === "surprise" ? 40 + Math.min(10, Math.abs(finding.size)) : 0),
  revised: () => 5,
  "incomplete-period": () => 0,
  "no-new-values": () => 0,
  gaps: () => 1,
  "past-break": () => 2,
  "forecast-note": () => 1,
  "event-effect": () => 0,
};

/** How far the statistic lies past its boundary, 0..15, so that the clearest change comes first. */
function excess(finding: Extract<Finding, { code: "change" }>): number {
  const past = finding.evidence.statistic - finding.evidence.boundary;
  return Number.isFinite(past) ? Math.max(0, Math.min(15, past)) : 0;
}

/** A change told for the first time asks for more than one that was told before. */
function toldFirst(facts: SeriesFacts): number {
  return facts.findings.some((one) => one.code === "change" && isToldFirst(one, facts)) ? 30 : 0;
}

/** How much a series asks for attention: fresh changes, late data, a likely limit, surprises, then small matters. */
export function attentionTo(facts: SeriesFacts): number {
  const findings = facts.findings.reduce((sum, finding) => sum + weights[finding.code](finding), 0);
  const limit = Math.max(0, ...facts.forecast.chances.map((one) => one.any));
  return findings + toldFirst(facts) + (limit >= likely ? 50 * limit : 0);
}

/** From this attention on a series has news; below it, it is steady. */
export const newsFrom = 25;

/** All series of a run: those with news first, the most needing attention leading; the steady in the tables' order. */
export function ranked(run: Pick<RunFacts, "tables">): Ranked[] {
  return run.tables
    .flatMap((table) => table.series.map((facts) => ({ table, facts, attention: attentionTo(facts) })))
    .sort((one, other) => newsOf(other) - newsOf(one));
}

const newsOf = ({ attention }: Ranked) => (attention >= newsFrom ? attention : 0);
