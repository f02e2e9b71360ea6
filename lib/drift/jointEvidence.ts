import { type LookState, lastChangeTime } from "./lookState.ts";
import type { ChangeKind } from "./notice.ts";
import { factorInPlace } from "./smallMatrix.ts";

/** ln ρ tried for the shock size when kinds are weighed together. */
const logRatios = [0.3, 0.4, 0.7, 1.1, -0.4, -0.7];
/** Prior weight of all single kinds, all pairs, all triples. */
const priorBySize = [0, 0.75, 0.21, 0.04];

/** One subset of the kinds at one change time, with its log weight (prior times marginal likelihood). */
export interface Explanation {
  /** Bit k stands for kind k of the state. */
  readonly kinds: number;
  readonly time: number;
  readonly logRatio: number;
  readonly logWeight: number;
}

/**
 * Marginal likelihoods of all sets of up to three kinds of change at a common time, for every time: the
 * regression on the null columns (flat priors) and the columns of the kinds (normal priors), rows after the
 * change weighted 1/ρ² when the shock size is among them. One matrix a time and ρ serves all sets.
 */
export function weighExplanations(state: LookState): Explanation[] {
  const { kinds, start } = state;
  const plan = planColumns(state);
  const sets = subsets(kinds.length);
  const sizes = sets.map(countBits);
  const numberOf = [0, 1, 2, 3].map((size) => sizes.filter((one) => one === size).length);
  const shock = 1 << kinds.indexOf("shock-size");
  const explanations: Explanation[] = [];
  const full = new Float64Array(plan.size * plan.size);
  for (let time = lastChangeTime(state); time >= start; time--) {
    if (state.isGap[time]) continue;
    for (const logRatio of [0, ...logRatios]) {
      const logJacobian = fillMatrix(state, plan, time, logRatio, full);
      sets.forEach((set, index) => {
        if (((set & shock) !== 0) !== (logRatio !== 0)) return;
        const chosen = plan.columnsOf(set);
        const logMarginal = logJacobian + marginal(state, plan, full, chosen);
        const prior = priorBySize[sizes[index]] / numberOf[sizes[index]];
        const share = logRatio === 0 ? 1 : 1 / logRatios.length;
        explanations.push({ kinds: set, time, logRatio, logWeight: logMarginal + Math.log(prior * share) });
      });
    }
  }
  return explanations;
}

/** A column of a kind of change and the prior variance of its coefficient. */
export interface ColumnChoice {
  readonly column: number;
  readonly prior: number;
}

interface ColumnPlan {
  /** Null columns, then those of the kinds, then the value itself. */
  readonly size: number;
  /** First column and priors of each kind; none for the shock size. */
  readonly first: readonly number[];
  readonly priors: readonly Float64Array[];
  readonly columnsOf: (set: number) => ColumnChoice[];
}

export function planColumns(state: LookState): ColumnPlan {
  const first: number[] = [];
  const priors: Float64Array[] = [];
  let place = state.columns;
  for (const [index, kind] of state.kinds.entries()) {
    const own =
      kind === "persistence"
        ? state.work.lagPriors
        : (state.work.meanKinds.find((one) => one.kind === index)?.priors ?? new Float64Array(0));
    first.push(place);
    priors.push(own);
    place += own.length;
  }
  const columnsOf = (set: number) =>
    state.kinds.flatMap((_, kind) =>
      set & (1 << kind) ? Array.from(priors[kind], (prior, i) => ({ column: first[kind] + i, prior })) : [],
    );
  return { size: place + 1, first, priors, columnsOf };
}

/**
 * Fills the lower triangle of the weighted normal matrix of all columns; returns the log Jacobian of the scales.
 * Weights are those of Student's likelihood at the scale in force, (ν+1)/(ν+z²) of z = e/(σ ρ), and what the
 * weighted square lacks to the loss (ν+1)·ln(1+z²/ν) is added to the square of the value itself, so that the
 * weighted sum of squares is the loss and a larger scale is neither favoured nor held against.
 */
export function fillMatrix(
  state: LookState,
  plan: ColumnPlan,
  change: number,
  logRatio: number,
  matrix: Float64Array,
): number {
  const { columns, order, terms, count, reference, cleaned } = state;
  const { size } = plan;
  const nu = reference.degreesOfFreedom;
  matrix.fill(0);
  const row = new Float64Array(size);
  let after = 0;
  for (let time = order; time < count; time++) {
    if (state.isGap[time]) continue;
    for (let i = 0; i < terms; i++) row[i] = state.termRows[time * terms + i];
    for (let lag = 1; lag <= order; lag++) row[terms + lag - 1] = cleaned[time - lag];
    row[size - 1] = cleaned[time];
    let scale = reference.studentScale;
    if (time >= change) {
      writeChangeColumns(state, plan, change, time, row);
      scale *= Math.exp(logRatio);
      after++;
    }
    const z2 = (state.cleanedResiduals[time] / scale) ** 2;
    const unscaled = (nu + 1) / (nu + z2);
    const weight = unscaled / (scale * scale);
    const last = time < change ? columns : size - 1;
    for (let i = 0; i < last; i++) {
      const weighted = weight * row[i];
      for (let j = 0; j <= i; j++) matrix[i * size + j] += weighted * row[j];
    }
    const base = (size - 1) * size;
    for (let j = 0; j < size; j++) matrix[base + j] += weight * row[size - 1] * row[j];
    matrix[base + size - 1] += (nu + 1) * Math.log1p(z2 / nu) - unscaled * z2;
  }
  return -after * logRatio;
}

/** The columns of all kinds in row `time` ≥ `change`. */
function writeChangeColumns(
  state: LookState,
  plan: ColumnPlan,
  change: number,
  time: number,
  row: Float64Array,
): void {
  const { reference, terms, termRows, order } = state;
  const reach = Math.min(order, time - change);
  for (const { kind, first, sums } of state.work.meanKinds) {
    const shift = state.kinds[kind] === "trend" ? termRows[(change - 1) * terms + first] : 0;
    for (let g = 0; g < sums.size; g++) {
      let sum = 0;
      for (let j = 0; j <= reach; j++)
        sum += reference.weights[j] * (termRows[(time - j) * terms + first + g] - shift);
      row[plan.first[kind] + g] = sum;
    }
  }
  const persistence = plan.first[state.kinds.indexOf("persistence" satisfies ChangeKind)];
  for (let lag = 1; lag <= order; lag++) row[persistence + lag - 1] = state.deviations[time - lag];
}

/** The rows and columns of the null fit, the chosen kinds (their priors added) and the value. */
export function selectMatrix(
  plan: ColumnPlan,
  columns: number,
  full: Float64Array,
  chosen: readonly ColumnChoice[],
): Float64Array {
  const size = columns + chosen.length + 1;
  const part = new Float64Array(size * size);
  const place = (i: number) => (i < columns ? i : i < size - 1 ? chosen[i - columns].column : plan.size - 1);
  for (let i = 0; i < size; i++)
    for (let j = 0; j <= i; j++) part[i * size + j] = full[place(i) * plan.size + place(j)];
  for (let i = 0; i < chosen.length; i++) part[(columns + i) * (size + 1)] += 1 / chosen[i].prior;
  return part;
}

function marginal(
  state: LookState,
  plan: ColumnPlan,
  full: Float64Array,
  chosen: readonly ColumnChoice[],
): number {
  const size = state.columns + chosen.length + 1;
  const part = selectMatrix(plan, state.columns, full, chosen);
  let logPriors = 0;
  for (const { prior } of chosen) logPriors += Math.log(prior);
  const logDeterminant = factorInPlace(part, size);
  const logRest = 2 * Math.log(part[size * size - 1]);
  return -0.5 * (logDeterminant - logRest + logPriors) - 0.5 * state.degreesOfFreedom * logRest;
}

/** All sets of one to three of `count` kinds, as bits. */
function subsets(count: number): number[] {
  const all = Array.from({ length: (1 << count) - 1 }, (_, i) => i + 1);
  return all.filter((set) => countBits(set) <= 3);
}

function countBits(set: number): number {
  let bits = 0;
  for (let rest = set; rest > 0; rest >>= 1) bits += rest & 1;
  return bits;
}
