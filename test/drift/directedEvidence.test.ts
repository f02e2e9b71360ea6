import { describe, expect, it } from "vitest";
import { appendValue } from "../../lib/drift/appendValue.ts";
import { columnEvidence } from "../../lib/drift/columnEvidence.ts";
import { copySums, emptySums } from "../../lib/drift/columnSums.ts";
import { directedEvidence } from "../../lib/drift/directedEvidence.ts";
import { look } from "../../lib/drift/look.ts";
import { openLookState } from "../../lib/drift/lookState.ts";
import { fitReference } from "../../lib/drift/reference.ts";
import { simulatedSeries } from "./simulatedSeries.ts";

/** A look at a series whose persistence rises or falls, and the sums of its lag over all monitored rows. */
function lookAt(coefficient: number, coefficientAfter: number) {
  const plan = { seed: 6, length: 196, changeAt: 156, coefficient, coefficientAfter };
  const values = Float64Array.from(simulatedSeries(plan));
  const reference = fitReference(values.slice(0, 156), { trend: false, season: 0 }, 1, 1);
  const state = openLookState(reference, 52, 52);
  for (const value of values.subarray(156)) appendValue(state, (value - reference.centre) / reference.scale);
  look(state);
  return { state, sums: state.work.lagTail, column: new Float64Array(state.columns) };
}

describe("directedEvidence", () => {
  it("gives rise and fall of one size together the weight of the whole normal prior", () => {
    const { state, sums, column } = lookAt(0.3, 0.7);
    const both = directedEvidence(state, sums, { rise: 0.35, fall: 0.35, rises: 0.5 }, column);
    const copy = emptySums(1, state.columns);
    copySums(sums, copy);
    expect(both).toBeCloseTo(columnEvidence(state, copy, Float64Array.of(0.35 ** 2)), 9);
  });

  it("tells a rise from a fall", () => {
    const directions = (before: number, after: number) => {
      const { state, sums, column } = lookAt(before, after);
      const towards = (rises: number) =>
        directedEvidence(state, sums, { rise: 0.35, fall: 0.35, rises }, column);
      return towards(1) - towards(0);
    };
    expect(directions(0.2, 0.9)).toBeGreaterThan(3);
    expect(directions(0.9, 0.1)).toBeLessThan(-3);
  });
});
