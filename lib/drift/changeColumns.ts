import type { LookState } from "./lookState.ts";

/** A column of a kind of change and the prior variance of its coefficient. */
export interface ColumnChoice {
  readonly column: number;
  readonly prior: number;
}

/** The null columns, then those of the kinds, then the value itself. */
export interface ColumnPlan {
  readonly size: number;
  /** First column and priors of each kind; none for the shock size. */
  readonly first: readonly number[];
  readonly priors: readonly Float64Array[];
  /** Columns of a set of kinds, given as bits. */
  readonly columnsOf: (set: number) => ColumnChoice[];
}

/**
 * Once a change is noticed, a level or a slope may have moved far more than the watching priors expect, and would
 * else be taken for larger shocks or for persistence that drives the series away: prior variances times this.
 */
const room: Readonly<Record<string, number>> = { level: 4, trend: 6 };

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
    priors.push(own.map((prior) => prior * (room[kind] ?? 1)));
    place += own.length;
  }
  const columnsOf = (set: number) =>
    state.kinds.flatMap((_, kind) =>
      set & (1 << kind) ? Array.from(priors[kind], (prior, i) => ({ column: first[kind] + i, prior })) : [],
    );
  return { size: place + 1, first, priors, columnsOf };
}

/** Writes the monitored rows, all columns of the plan, for a change from `change` on: one row after another. */
export function writeRows(state: LookState, plan: ColumnPlan, change: number, rows: Float64Array): void {
  const { terms, order, start, count, cleaned, termRows } = state;
  rows.fill(0);
  for (let time = start; time < count; time++) {
    const base = (time - start) * plan.size;
    for (let i = 0; i < terms; i++) rows[base + i] = termRows[time * terms + i];
    for (let lag = 1; lag <= order; lag++) rows[base + terms + lag - 1] = cleaned[time - lag];
    if (time >= change) writeChange(state, plan, change, time, rows, base);
    rows[base + plan.size - 1] = cleaned[time];
  }
}

function writeChange(
  state: LookState,
  plan: ColumnPlan,
  change: number,
  time: number,
  rows: Float64Array,
  base: number,
): void {
  const { reference, terms, termRows, order } = state;
  const reach = Math.min(order, time - change);
  for (const { kind, first, sums } of state.work.meanKinds) {
    const shift = state.kinds[kind] === "trend" ? termRows[(change - 1) * terms + first] : 0;
    for (let g = 0; g < sums.size; g++) {
      let sum = 0;
      for (let j = 0; j <= reach; j++)
        sum += reference.weights[j] * (termRows[(time - j) * terms + first + g] - shift);
      rows[base + plan.first[kind] + g] = sum;
    }
  }
  const persistence = plan.first[state.kinds.indexOf("persistence")];
  for (let lag = 1; lag <= order; lag++) rows[base + persistence + lag - 1] = state.deviations[time - lag];
}
