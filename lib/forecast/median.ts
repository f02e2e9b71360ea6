import { medianSorted } from "simple-statistics";

/** The median of the values that are not gaps; `NaN` when there is none. */
export function median(values: Float64Array): number {
  const sorted = Array.from(values.filter((value) => !Number.isNaN(value)).sort());
  return sorted.length === 0 ? Number.NaN : medianSorted(sorted);
}
