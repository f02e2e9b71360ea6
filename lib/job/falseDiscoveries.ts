import type { Finding } from "../words/facts.ts";
import type { StoredSeries } from "./modelDocument.ts";

type ChangeFinding = Extract<Finding, { code: "change" }>;

/**
 * How improbable a steady series is to bring a statistic this far past its boundary in a year of looks. The
 * statistic is the logarithm of an average likelihood ratio, whose largest value falls off at least as fast as
 * e^−x (Ville 1939): what passes by m has at most e^−m of the false-alarm rate. In simulations of stable series the tail
 * fell faster (a tenth of the rate at 1.1 to 1.8 past the boundary, where this allows 2.3), so this errs to caution.
 */
export function changeProbability({ evidence }: ChangeFinding): number {
  return Math.min(1, evidence.falseAlarmRate * Math.exp(evidence.boundary - evidence.statistic));
}

/**
 * The largest probability that may count as a discovery among `total` tests with the expected share of false ones held
 * at `rate`; 0 when none may (Benjamini and Hochberg 1995).
 *
 * @example discoveryBound([0.001, 0.02, 0.8], 3, 0.05) // 0.02
 */
export function discoveryBound(probabilities: readonly number[], total: number, rate: number): number {
  const ascending = [...probabilities].sort((a, b) => a - b);
  return ascending.reduce(
    (bound, value, index) => (value <= (rate * (index + 1)) / total ? value : bound),
    0,
  );
}

/** Tells only those changes of a table that keep the share of false ones within `rate`; the others stay on record. */
export function tellDiscoveries(series: readonly StoredSeries[], rate: number): StoredSeries[] {
  const isChange = (finding: Finding): finding is ChangeFinding => finding.code === "change";
  const probabilities = series.flatMap(({ facts }) => facts.findings.filter(isChange).map(changeProbability));
  const watched = series.filter(({ facts }) => facts.monitor !== null).length;
  const bound = discoveryBound(probabilities, Math.max(watched, probabilities.length), rate);
  return series.map((stored) => ({
    ...stored,
    facts: {
      ...stored.facts,
      findings: stored.facts.findings.map((finding) =>
        isChange(finding) && changeProbability(finding) > bound ? { ...finding, fresh: false } : finding,
      ),
    },
  }));
}
