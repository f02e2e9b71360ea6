import { describe, expect, it } from "vitest";
import { hasClusters } from "../../lib/drift/clustering.ts";
import { fitReference } from "../../lib/drift/reference.ts";
import { drawSeries } from "../bench/driftCases.ts";

const rounds = 200;

/** Share of references of 156 values in which clusters are seen. */
function share(clustering: readonly [number, number] | undefined): number {
  let seen = 0;
  for (let seed = 1; seed <= rounds; seed++) {
    const series = drawSeries({ name: "", coefficients: [0.5], clustering }, 156, seed).subarray(0, 156);
    if (hasClusters(fitReference(series, { trend: false, season: 0 }, 1, 1))) seen++;
  }
  return seen / rounds;
}

describe("clusters of large shocks", () => {
  it("are suspected in about a tenth of the series that have none", () => {
    // Nominal 10 %; three standard errors of 200 draws are 6.4 points.
    expect(share(undefined)).toBeLessThan(0.164);
  });

  it("are seen in most series whose shocks follow a GARCH recursion (Bollerslev 1986)", () => {
    expect(share([0.3, 0.6])).toBeGreaterThan(0.75);
    expect(share([0.1, 0.8])).toBeGreaterThan(0.3);
  });
});
