import { type ColumnSums, emptySums } from "./columnSums.ts";
import type { ChangeKind } from "./notice.ts";
import { emptyPatch, overlapTable, type Patch } from "./outlierPatch.ts";
import type { Reference } from "./reference.ts";
import { studentTable } from "./studentTable.ts";
import { seasonColumns, termColumns } from "./terms.ts";

/** Log σ steps of the shock-size likelihoods: grid[i] = (i − 12)·0.1 around the reference scale. */
export const scaleGrid = 33;

/** Scratch of the single steps. */
export interface LookWork {
  readonly scores: Float64Array;
  readonly overlaps: Float64Array;
  readonly patch: Patch;
  readonly candidate: Patch;
  readonly row: Float64Array;
  readonly tail: ColumnSums;
  readonly here: ColumnSums;
  readonly switched: Float64Array;
  /** Kinds that are changes of a term: index of the kind, its first term, room for its sums, its priors. */
  readonly meanKinds: readonly {
    readonly kind: number;
    readonly first: number;
    readonly sums: ColumnSums;
    readonly priors: Float64Array;
  }[];
  readonly lagTail: ColumnSums;
  readonly lagHere: ColumnSums;
  readonly lagRow: Float64Array;
  readonly lagPriors: Float64Array;
  readonly lagColumn: Float64Array;
  /** Student log density, see studentTable. */
  readonly table: Float64Array;
  /** Log-likelihood of the reference rows on the σ grid. */
  readonly beforeAll: Float64Array;
}

/** Prior size of a change of level, in standard deviations of the series. */
const levelPrior = 1.2;
/** A change of slope is expected to move the series by `levelPrior` deviations within this many periods. */
const slopeSpan = 26;
/** Prior size of a change of the seasonal pattern, in standard deviations of the series. */
const seasonPrior = 1.2;
/** Prior standard deviation of a change of each coefficient. */
const persistencePrior = 0.35;

export function openWork(reference: Reference, kinds: readonly ChangeKind[], capacity: number): LookWork {
  const { order, deviation } = reference;
  const terms = termColumns(reference);
  const columns = terms + order;
  const season = seasonColumns(reference.season);
  const variance = deviation ** 2;
  const mean = (name: ChangeKind, first: number, size: number, prior: number) => {
    const kind = kinds.indexOf(name);
    if (kind < 0) return [];
    return [{ kind, first, sums: emptySums(size, columns), priors: new Float64Array(size).fill(prior) }];
  };
  const slopePerUnit = (levelPrior * reference.values.length) / slopeSpan;
  return {
    scores: new Float64Array(capacity),
    overlaps: overlapTable(reference.weights),
    patch: emptyPatch(),
    candidate: emptyPatch(),
    row: new Float64Array(columns),
    tail: emptySums(terms, columns),
    here: emptySums(terms, columns),
    switched: new Float64Array(terms),
    meanKinds: [
      ...mean("level", 0, 1, levelPrior ** 2 * variance),
      ...mean("trend", 1, 1, slopePerUnit ** 2 * variance),
      ...mean("season", terms - season, season, (2 * seasonPrior ** 2 * variance) / Math.max(1, season)),
    ],
    lagTail: emptySums(order, columns),
    lagHere: emptySums(order, columns),
    lagRow: new Float64Array(order),
    lagPriors: new Float64Array(order).fill(persistencePrior ** 2),
    lagColumn: new Float64Array(columns),
    table: studentTable(reference.degreesOfFreedom),
    beforeAll: new Float64Array(scaleGrid),
  };
}
