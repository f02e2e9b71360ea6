import { interpolateGaps } from "./fillGaps.ts";
import type { LookState } from "./lookState.ts";

/** What the reference expects next, in shocks from its centre. */
export function expectedNext(state: LookState): number {
  const { reference, count, terms, order } = state;
  let sum = 0;
  for (let i = 0; i < terms; i++) sum += reference.coefficients[i] * state.termRows[count * terms + i];
  for (let lag = 1; lag <= order; lag++)
    sum += reference.coefficients[terms + lag - 1] * state.values[count - lag];
  return sum;
}

/**
 * Takes one scaled value in. A gap (`NaN`) holds its prediction at first and moves to its interpolation as
 * later values arrive; it uses no look, because it teaches nothing.
 */
export function appendValue(state: LookState, value: number): void {
  if (state.count >= state.values.length) throw new RangeError("the monitor has no room for more values");
  const expected = expectedNext(state);
  const time = state.count;
  const gap = Number.isNaN(value);
  state.isGap[time] = gap ? 1 : 0;
  state.values[time] = gap ? expected : value;
  state.residuals[time] = state.values[time] - expected;
  state.count++;
  if (gap) return;
  const recent: number[] = [];
  // A gap's interpolation settles within twice the order of later values; older ones stay as they are.
  for (let at = Math.max(state.start, time - 2 * state.order - 2); at < time; at++)
    if (state.isGap[at]) recent.push(at);
  if (recent.length > 0)
    interpolateGaps(state.values, state.residuals, recent, state.reference.weights, state.count);
}
