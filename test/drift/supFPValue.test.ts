import { describe, expect, it } from "vitest";
import { supFPValue } from "../../lib/drift/supFPValue.ts";

describe("supFPValue", () => {
  // Andrews (1993), table 1, π₀ = 0.15, and the corrected values of Andrews (2003); both were simulated.
  it.each([
    [1, 8.85, 8.68],
    [2, 11.79, 11.72],
    [3, 14.15, 14.13],
  ])("with %d parameters is 5 %% between the printed critical values", (columns, older, newer) => {
    const points = [supFPValue(older, columns, 0.15), supFPValue(newer, columns, 0.15)];
    for (const p of points) expect(Math.abs(p - 0.05)).toBeLessThan(0.004);
  });

  it("falls as the statistic grows and stays a probability", () => {
    for (const columns of [1, 2, 4, 9])
      for (let statistic = 0.5, last = 1; statistic < 60; statistic += 0.5) {
        const p = supFPValue(statistic, columns, 0.1);
        expect(p).toBeLessThanOrEqual(last);
        expect(p).toBeGreaterThanOrEqual(0);
        last = p;
      }
  });
});
