import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { demoTables } from "../../events/demo/makeDemo.ts";
import { demoTruths as truths } from "../../events/demo/truths.ts";

describe("the demo tables", () => {
  it.each(Object.entries(demoTables()))(
    "%s stands in the repository as its generator makes it",
    (name, text) => {
      expect(readFileSync(`events/demo/series/${name}`, "utf8")).toBe(text);
    },
  );

  it("hold five years of weeks for four branches, with Mill's closed fortnight as two empty cells", () => {
    const rows = demoTables()
      ["loans.csv"].trim()
      .split("\n")
      .map((line) => line.split(","));
    expect(rows[0]).toEqual(["week", "Quay", "Mill", "Park", "Station"]);
    expect(rows).toHaveLength(1 + truths.loans.weeks);
    const closed = rows.filter((row) => row.includes(""));
    expect(closed.map((row) => row[0])).toEqual(truths.loans.Mill.closedWeeks);
    expect(closed.every((row) => row[2] === "")).toBe(true);
  });

  it("follow the planted coefficients: the lag-1 regression of each stretch finds them within three standard errors", () => {
    const rows = demoTables()
      ["loans.csv"].trim()
      .split("\n")
      .map((line) => line.split(","));
    const changed = rows.findIndex((row) => row[0] === truths.loans.Quay.changedInWeek);
    const quay = rows.map((row) => Number(row[1]));
    const cases: [number[], number][] = [
      [quay.slice(1, changed), truths.loans.Quay.before],
      [quay.slice(changed), truths.loans.Quay.after],
      [rows.slice(1).map((row) => Number(row[3])), truths.loans.Park.coefficient],
    ];
    for (const [values, planted] of cases) {
      const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
      const lagged = values.slice(0, -1).map((value) => value - mean);
      const next = values.slice(1).map((value) => value - mean);
      const slope =
        lagged.reduce((sum, value, i) => sum + value * next[i], 0) /
        lagged.reduce((sum, value) => sum + value ** 2, 0);
      // Var(φ̂) ≈ (1 − φ²)/n, and a bias of −(1 + 3φ)/n (Kendall 1954) on top.
      const allowed = 3 * Math.sqrt((1 - planted ** 2) / lagged.length) + (1 + 3 * planted) / lagged.length;
      expect(Math.abs(slope - planted)).toBeLessThan(allowed);
    }
  });
});
