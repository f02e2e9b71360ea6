import { evenBoundaries, stableMaxima } from "./bootstrapBoundaries.ts";
import { tabulatedBoundaries } from "./boundaryTable.ts";
import type { Reference } from "./reference.ts";

export interface BoundaryRequest {
  readonly looks: number;
  readonly falseAlarmRate: number;
  readonly seed: number;
  /** Simulate even where the table would do. */
  readonly bootstrap: boolean;
}

/** Paths simulated for boundaries of a reference outside the table. */
const paths = 999;

/** One boundary a watched kind, and where they come from. */
export function boundariesFor(
  reference: Reference,
  { looks, falseAlarmRate, seed, bootstrap }: BoundaryRequest,
): { readonly boundaries: Float64Array; readonly source: "table" | "bootstrap" } {
  const tabulated = bootstrap ? undefined : tabulatedBoundaries(reference, looks, falseAlarmRate);
  if (tabulated !== undefined) return { boundaries: tabulated, source: "table" };
  const maxima = stableMaxima(reference, looks, paths, seed);
  return { boundaries: evenBoundaries(maxima, falseAlarmRate), source: "bootstrap" };
}
