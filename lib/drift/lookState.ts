import { type LookWork, openWork, scaleGrid } from "./lookWork.ts";
import type { ChangeKind } from "./notice.ts";
import type { Reference } from "./reference.ts";
import { seasonColumns, termColumns, writeTerms } from "./terms.ts";

/** The kinds a reference watches: trend and season only when it carries such terms. */
export function watchedKinds(plan: { readonly trend: boolean; readonly season: number }): ChangeKind[] {
  const kinds: ChangeKind[] = ["level", "persistence", "shock-size"];
  if (plan.trend) kinds.push("trend");
  if (seasonColumns(plan.season) > 0) kinds.push("season");
  return kinds;
}

/**
 * Working memory of a monitor at work: everything is allocated once a reference, so that a look allocates
 * nothing. Times count from the first reference value; rows of the regression are times ≥ order.
 */
export interface LookState {
  readonly reference: Reference;
  readonly kinds: readonly ChangeKind[];
  readonly looks: number;
  readonly start: number;
  readonly order: number;
  readonly terms: number;
  readonly columns: number;
  readonly capacity: number;
  /** Values so far, reference included. */
  count: number;
  looksUsed: number;
  /** Scaled values; gaps hold their interpolation. */
  readonly values: Float64Array;
  readonly isGap: Uint8Array;
  /** Residuals of `values` under the reference coefficients. */
  readonly residuals: Float64Array;
  /** The copy cleaned of outliers for level and persistence, and the milder one for the shock size. */
  readonly cleaned: Float64Array;
  readonly cleanedResiduals: Float64Array;
  /** `cleaned` less the centreline of the reference. */
  readonly deviations: Float64Array;
  readonly shockValues: Float64Array;
  readonly outliers: Int32Array;
  outlierCount: number;
  /** Terms of each time, row by row. */
  readonly termRows: Float64Array;
  readonly centreline: Float64Array;
  /** φ̂(B) applied to each term. */
  readonly filteredTerms: Float64Array;
  /** Huber weights, 0 for a gap. */
  readonly rowWeights: Float64Array;
  /** Normal equations of the reference rows alone, and of all rows. */
  readonly referenceCross: Float64Array;
  readonly referenceMoment: Float64Array;
  referenceSquares: number;
  referenceRows: number;
  readonly factor: Float64Array;
  readonly moment: Float64Array;
  readonly fitResiduals: Float64Array;
  sumOfSquares: number;
  degreesOfFreedom: number;
  /** Student log-likelihood on the σ grid of the values before each monitored time. */
  readonly cumulated: Float64Array;
  /** ln BF of each kind (row) by monitored change time; −∞ where it cannot be judged yet. */
  readonly logBayes: Float64Array;
  /** Number of judged change times, and the statistic, of each kind. */
  readonly judged: Int32Array;
  readonly statistics: Float64Array;
  /** Σ BF of each kind. */
  readonly sums: Float64Array;
  readonly work: LookWork;
}

/** Shortest stretch after a change that can be judged, in values. */
const shortestAfter = 3;

/** The latest change time that has enough values after it. */
export function lastChangeTime(state: LookState): number {
  let observed = 0;
  for (let time = state.count - 1; time >= state.start; time--) {
    if (!state.isGap[time]) observed++;
    if (observed === shortestAfter) return time;
  }
  return state.start - 1;
}

/** Sets up working memory for a reference and up to `capacity` further values. */
export function openLookState(reference: Reference, looks: number, capacity: number): LookState {
  const { order } = reference;
  const start = reference.values.length;
  const terms = termColumns(reference);
  const columns = terms + order;
  const total = start + capacity;
  const kinds = watchedKinds(reference);
  const state: LookState = {
    reference,
    kinds,
    looks,
    start,
    order,
    terms,
    columns,
    capacity,
    count: start,
    looksUsed: 0,
    values: new Float64Array(total),
    isGap: new Uint8Array(total),
    residuals: new Float64Array(total),
    cleaned: new Float64Array(total),
    cleanedResiduals: new Float64Array(total),
    deviations: new Float64Array(total),
    shockValues: new Float64Array(total),
    outliers: new Int32Array(8),
    outlierCount: 0,
    termRows: new Float64Array(total * terms),
    centreline: new Float64Array(total),
    filteredTerms: new Float64Array(total * terms),
    rowWeights: new Float64Array(total),
    referenceCross: new Float64Array(columns * columns),
    referenceMoment: new Float64Array(columns),
    referenceSquares: 0,
    referenceRows: 0,
    factor: new Float64Array(columns * columns),
    moment: new Float64Array(columns),
    fitResiduals: new Float64Array(total),
    sumOfSquares: 0,
    degreesOfFreedom: 0,
    cumulated: new Float64Array((capacity + 1) * scaleGrid),
    logBayes: new Float64Array(kinds.length * capacity),
    judged: new Int32Array(kinds.length),
    statistics: new Float64Array(kinds.length),
    sums: new Float64Array(kinds.length),
    work: openWork(reference, kinds, capacity),
  };
  for (let time = 0; time < total; time++) {
    writeTerms(state.termRows, time * terms, reference, time, start, start);
    let sum = 0;
    for (let term = 0; term < terms; term++)
      sum += reference.centreline[term] * state.termRows[time * terms + term];
    state.centreline[time] = sum;
  }
  for (let time = order; time < total; time++)
    for (let term = 0; term < terms; term++) {
      let sum = 0;
      for (let j = 0; j <= order; j++)
        sum += reference.weights[j] * state.termRows[(time - j) * terms + term];
      state.filteredTerms[time * terms + term] = sum;
    }
  loadReference(state);
  return state;
}

/** Copies the reference in and sums what no look changes. */
export function loadReference(state: LookState): void {
  const { reference, start, order, columns, terms } = state;
  state.count = start;
  state.looksUsed = 0;
  state.values.set(reference.values);
  state.cleaned.set(reference.values);
  state.isGap.set(reference.isGap);
  state.residuals.set(reference.residuals);
  state.cleanedResiduals.set(reference.residuals);
  state.shockValues.set(reference.values);
  for (let time = 0; time < start; time++)
    state.deviations[time] = state.cleaned[time] - state.centreline[time];
  state.referenceCross.fill(0);
  state.referenceMoment.fill(0);
  state.referenceSquares = 0;
  state.referenceRows = 0;
  const { row } = state.work;
  for (let time = order; time < start; time++) {
    const weight = state.isGap[time] ? 0 : Math.min(1, huber / Math.abs(state.residuals[time]));
    state.rowWeights[time] = weight;
    if (weight === 0) continue;
    state.referenceRows++;
    for (let i = 0; i < terms; i++) row[i] = state.termRows[time * terms + i];
    for (let lag = 1; lag <= order; lag++) row[terms + lag - 1] = state.values[time - lag];
    const value = state.values[time];
    for (let i = 0; i < columns; i++) {
      const weighted = weight * row[i];
      state.referenceMoment[i] += weighted * value;
      for (let j = 0; j <= i; j++) state.referenceCross[i * columns + j] += weighted * row[j];
    }
    state.referenceSquares += weight * value * value;
  }
}

/** Residuals beyond this many shocks are weighted down in proportion (Huber). */
export const huber = 2;
