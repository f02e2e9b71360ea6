import { describe, expect, it } from "vitest";
import { costTable, type Measured, monthlyCost, scenarios } from "../bench/costs.ts";
import prices from "../bench/prices.json" with { type: "json" };

const measured: Measured = {
  millisecondsPerSeries: 20,
  requestsPerTable: { puts: 3, gets: 4, lists: 1 },
  requestsPerRun: { puts: 20, gets: 20, lists: 6 },
  bytesPerSeries: 2000,
  bytesPerRun: 500_000,
  millisecondsPerRequest: 0,
};
const million = { name: "", series: 1_000_000, seriesPerTable: 100, runsPerMonth: 1, fleet: true };

describe("the cost of a deployment", () => {
  it("for a million series at 20 ms is 20,000 seconds of one vCPU, by hand 0.46 dollars of compute", () => {
    // 20,000 s × 1769/1024 GB × 0.0000133334; on top the run's ten seconds and the watch, under a cent.
    expect(monthlyCost(million, measured, prices).compute).toBeCloseTo(
      20_000 * (1769 / 1024) * 0.0000133334 + 71 * 1.7275 * 0.0000133334,
      3,
    );
  });

  it("counts three writes, four reads and a listing for each of ten thousand tables, by hand 0.216 dollars", () => {
    const { requests } = monthlyCost(million, measured, prices);
    // 10,000 × (3 × 0.000005 + 4 × 0.0000004 + 0.000005); 400 portions of three transitions; 402 invocations.
    const byHand = 10_000 * (0.000015 + 0.0000016 + 0.000005) + 1206 * 0.000025;
    expect(requests).toBeGreaterThan(byHand);
    expect(requests - byHand).toBeLessThan(0.005);
  });

  it("keeps a year of runs, by hand 24.006 GB", () => {
    // 12 × (1,000,000 × 2,000 bytes + 500,000 bytes)
    const { storageAfterAYear } = monthlyCost(million, measured, prices);
    expect(storageAfterAYear).toBeCloseTo(24.006 * prices.s3GigabyteMonth, 10);
  });

  it("grows with series, runs and slowness, and never falls", () => {
    const base = monthlyCost(scenarios[1], measured, prices).total;
    for (const more of [
      monthlyCost({ ...scenarios[1], series: 20_000 }, measured, prices),
      monthlyCost({ ...scenarios[1], runsPerMonth: 30 }, measured, prices),
      monthlyCost(scenarios[1], { ...measured, millisecondsPerSeries: 40 }, prices),
    ])
      expect(more.total).toBeGreaterThan(base);
  });

  it("is told for three sizes in one table", () => {
    const lines = costTable(measured, prices).split("\n");
    expect(lines).toHaveLength(5);
    for (const line of lines) expect(line.split("|")).toHaveLength(8);
  });

  it("rests on a price file that says its day, region and sources", () => {
    expect(prices.date).toMatch(/^\d{4}-\d{2}-\d{2}$/);
    expect(prices.region).toBe("us-east-1");
    expect(prices.note.length).toBeGreaterThan(40);
  });
});
