import { describe, expect, it } from "vitest";
import { changeProbability, discoveryBound, tellDiscoveries } from "../../lib/job/falseDiscoveries.ts";
import type { StoredSeries } from "../../lib/job/modelDocument.ts";
import { withR } from "../support/r.ts";

// Benjamini and Hochberg 1995, section 4.1: the fifteen ordered p-values of their example; at 5 % the four smallest are
// rejected, where Bonferroni rejects three.
const published = [
  0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.324, 0.4262, 0.5719, 0.6528,
  0.759, 1,
];

const r = withR();

function changed(statistic: number): StoredSeries {
  const evidence = { statistic, boundary: 2, looksUsed: 10, looks: 52, falseAlarmRate: 0.05 };
  return {
    facts: { monitor: {}, findings: [{ code: "change", fresh: true, evidence }] },
  } as unknown as StoredSeries;
}
const steady = { facts: { monitor: {}, findings: [] } } as unknown as StoredSeries;

describe("holding the share of false notices", () => {
  it("rejects the four smallest of Benjamini and Hochberg's example", () => {
    expect(discoveryBound(published, 15, 0.05)).toBe(0.0095);
  });

  it("rejects as R's p.adjust does, whatever the order and the rate", async () => {
    const values = [0.2, 0.001, 0.04, 0.012, 0.9, 0.03, 0.0007, 0.5, 0.011];
    await r.assign("p", values);
    for (const rate of [0.01, 0.05, 0.1, 0.3]) {
      const bound = discoveryBound(values, values.length, rate);
      const kept = await r.evaluate(`as.numeric(p.adjust(p, method = "BH") <= ${rate})`);
      expect(values.map((value) => Number(value <= bound))).toEqual(kept);
    }
  });

  it("tells a strong change among many steady series and not one that only just passed its boundary", () => {
    const table = [changed(12), changed(2.1), ...Array<StoredSeries>(98).fill(steady)];
    const told = tellDiscoveries(table, 0.1).flatMap(({ facts }) => facts.findings);
    expect(told).toMatchObject([{ fresh: true }, { fresh: false }]);
  });

  it("counts a statistic at its boundary with the false-alarm rate itself", () => {
    const [finding] = changed(2).facts.findings;
    expect(finding.code === "change" && changeProbability(finding)).toBe(0.05);
  });
});
