import { describe, expect, it } from "vitest";
import { runMetrics, watchMetrics } from "../../functions/cloud/metrics.ts";
import type { RunSummary } from "../../lib/job/summary.ts";

const summary: RunSummary = {
  schema: 1,
  asOf: "2026-11-30T06:00:00Z",
  tables: 7,
  series: 21,
  notices: 2,
  surprises: 1,
  stale: ["a"],
  failed: [{ table: "b", problems: [] }],
  left: ["c", "d", "e"],
  deliveries: [
    { webhook: "x", audience: "business", asOf: "2026-11-30T06:00:00Z", status: "undelivered" },
    { webhook: "y", audience: "analyst", asOf: "2026-11-30T06:00:00Z", status: "delivered" },
  ],
  report: "runs/2026-11-30T06-00-00Z/report.html",
  durationMilliseconds: 1234.6,
};

// The rules of the Embedded Metric Format specification (CloudWatch user guide), by hand.
const units = ["Seconds", "Microseconds", "Milliseconds", "Bytes", "Count", "Percent", "None"];
// biome-ignore lint/suspicious/noExplicitAny: the document is looked into freely
function expectEmbeddedMetricFormat(document: any): void {
  expect(Number.isInteger(document._aws.Timestamp)).toBe(true);
  for (const { Namespace, Dimensions, Metrics } of document._aws.CloudWatchMetrics) {
    expect(Namespace).toMatch(/^[\w./#:-]{1,255}$/);
    for (const set of Dimensions) {
      expect(set.length).toBeLessThanOrEqual(30);
      for (const name of set) expect(typeof document[name]).toBe("string");
    }
    expect(Metrics.length).toBeLessThanOrEqual(100);
    for (const { Name, Unit } of Metrics) {
      expect(typeof document[Name]).toBe("number");
      expect(units).toContain(Unit);
    }
  }
}

describe("the metrics of a run", () => {
  it("follow the embedded metric format and count what the summary names", () => {
    const document = runMetrics(summary, "Test/Ebbwire", 1_796_018_405_000);
    expectEmbeddedMetricFormat(document);
    expect(document).toMatchObject({
      Deployment: "Test/Ebbwire",
      Tables: 7,
      Series: 21,
      Notices: 2,
      Stale: 1,
      Failed: 1,
      Left: 3,
      Undelivered: 1,
      RunDuration: 1235,
    });
  });

  it("hold no name of a table or webhook: metrics are kept longer than logs", () => {
    const text = JSON.stringify(runMetrics(summary, "d", 0));
    for (const name of ['"a"', '"b"', '"c"', '"x"', '"y"']) expect(text).not.toContain(name);
  });
});

describe("the metric of the watch", () => {
  it("follows the embedded metric format", () => {
    const document = watchMetrics(12.5, "Test/Ebbwire", 0);
    expectEmbeddedMetricFormat(document);
    expect(document).toMatchObject({ HoursSinceRun: 12.5 });
  });
});
