import { describe, expect, it } from "vitest";
import { summaryLines } from "../../functions/terminal.ts";
import type { DeliveryRecord, RunSummary } from "../../lib/job/summary.ts";

const asOf = "2026-12-07T06:00:00Z";
const summary: RunSummary = {
  schema: 1,
  asOf,
  tables: 1,
  series: 1,
  notices: 0,
  surprises: 0,
  stale: [],
  failed: [],
  left: [],
  deliveries: [],
  report: "runs/2026-12-07T06-00-00Z/report.html",
  durationMilliseconds: 1,
};

describe("what a run says on the terminal", () => {
  it("dates a note that is not its own", () => {
    const delivery: DeliveryRecord = {
      webhook: "tech",
      audience: "analyst",
      asOf,
      status: "not-configured",
      reason: "no web address stands behind env:TECH_WEBHOOK",
    };
    const deliveries = [{ ...delivery, asOf: "2026-11-30T06:00:00Z" }, delivery];
    expect(summaryLines({ ...summary, deliveries }, "S").slice(1, 3)).toEqual([
      "tech (analyst), the note of 2026-11-30T06:00:00Z: not configured: no web address stands behind env:TECH_WEBHOOK",
      "tech (analyst): not configured: no web address stands behind env:TECH_WEBHOOK",
    ]);
  });
});
