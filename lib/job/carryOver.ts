import type { Finding } from "../words/facts.ts";
import type { StoredSeries } from "./modelDocument.ts";

/** Made anew each run, or told once: these are not carried over. */
const passing: ReadonlySet<Finding["code"]> = new Set([
  "no-new-values",
  "stale",
  "revised",
  "incomplete-period",
  "past-break",
  "surprise",
]);

/** The account of a series of which no value changed since the last run: nothing is refitted, nothing told twice. */
export function carryOver(stored: StoredSeries, dataFindings: readonly Finding[]): StoredSeries {
  const kept = stored.facts.findings
    .filter((finding) => !passing.has(finding.code))
    .map((finding) => (finding.code === "change" ? { ...finding, fresh: false } : finding));
  return { ...stored, facts: { ...stored.facts, findings: [...kept, ...dataFindings] } };
}
