import { describe, expect, it } from "vitest";
import { spentBoundaries } from "../../lib/drift/bootstrapBoundaries.ts";
import { uniformNumbers } from "../../lib/drift/randomNumbers.ts";

describe("spentBoundaries", () => {
  it("lets five in a hundred paths pass any boundary, each kind as often as its part", () => {
    const uniform = uniformNumbers(4);
    const paths = 20_000;
    const parts = [1.5, 1, 0.5];
    const maxima = parts.map(() => Float64Array.from({ length: paths }, () => -Math.log(uniform())));
    const boundaries = spentBoundaries(maxima, parts, 0.05);
    const passing = parts.map((_, kind) => maxima[kind].filter((value) => value > boundaries[kind]).length);
    const any = Array.from({ length: paths }, (_, path) => path).filter((path) =>
      parts.some((_, kind) => maxima[kind][path] > boundaries[kind]),
    );
    // By construction, but for the paths that lie on a boundary.
    expect(any.length / paths).toBeCloseTo(0.05, 3);
    expect(passing[0] / passing[1]).toBeCloseTo(1.5, 1);
    expect(passing[2] / passing[1]).toBeCloseTo(0.5, 1);
  });
});
