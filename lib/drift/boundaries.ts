import { spentBoundaries, stableMaxima } from "./bootstrapBoundaries.ts";
import { tabulatedBoundaries } from "./boundaryTable.ts";
import { clusteringAllowance } from "./clustering.ts";
import { watchedKinds } from "./lookState.ts";
import type { Reference } from "./reference.ts";
import { spendingOf } from "./spending.ts";

export interface BoundaryRequest {
  readonly looks: number;
  readonly falseAlarmRate: number;
  readonly seed: number;
  /** Simulate even where the table would do. */
  readonly bootstrap: boolean;
}

/** Paths simulated for boundaries of a reference outside the table. */
const paths = 999;

/** One boundary a watched kind, and where they come from; the shock size pays for clustered shocks. */
export function boundariesFor(
  reference: Reference,
  request: BoundaryRequest,
): { readonly boundaries: Float64Array; readonly source: "table" | "bootstrap" } {
  const { looks, falseAlarmRate, seed, bootstrap } = request;
  const tabulated = bootstrap ? undefined : tabulatedBoundaries(reference, looks, falseAlarmRate);
  const kinds = watchedKinds(reference);
  const boundaries =
    tabulated ??
    spentBoundaries(stableMaxima(reference, looks, paths, seed), kinds.map(spendingOf), falseAlarmRate);
  boundaries[kinds.indexOf("shock-size")] += clusteringAllowance(reference);
  return { boundaries, source: tabulated === undefined ? "bootstrap" : "table" };
}
