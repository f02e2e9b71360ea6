import { appendValue, expectedNext } from "./appendValue.ts";
import { behaviourAfter, behaviourBefore } from "./behaviour.ts";
import { hasClusters } from "./clustering.ts";
import { look } from "./look.ts";
import { type LookState, openLookState } from "./lookState.ts";
import { fromStored, type Monitor, toStored } from "./monitor.ts";
import { nameChange } from "./nameChange.ts";
import type { ChangeNotice, Notice, Passed, SurpriseNotice } from "./notice.ts";
import { fitReference } from "./reference.ts";
import { findSurprises } from "./surprise.ts";

/** Looks after which a change is named again with what came since. */
const confirmAfter = 8;

/**
 * Takes new values in, one look each. A gap (`NaN`) uses no look. Notices come at the look that passed a
 * boundary, a second time (status `confirmed`) eight looks later; a surprise comes at once. One monitor notices
 * one change; when its looks are used up it keeps reporting surprises only, and a new one is to be started.
 *
 * Pure: the given monitor is left as it is.
 *
 * @example const { monitor, notices } = advanceMonitor(stored, [312])
 */
export function advanceMonitor(
  monitor: Monitor,
  newValues: ArrayLike<number>,
): { readonly monitor: Monitor; readonly notices: Notice[] } {
  const { monitor: advanced, notices } = takeValues(monitor, newValues, () => false);
  return { monitor: advanced, notices };
}

/** How far a monitor has come: what decides whether its successor is due. */
export type Progress = Pick<Monitor, "looks" | "looksUsed" | "change">;

/**
 * As `advanceMonitor`, but stops after the value with which `isDone` holds; `taken` says how many that were. The
 * reference is fitted once for all of them.
 */
export function takeValues(
  monitor: Monitor,
  newValues: ArrayLike<number>,
  isDone: (progress: Progress) => boolean,
): { readonly monitor: Monitor; readonly notices: Notice[]; readonly taken: number } {
  const state = resume(monitor, newValues.length);
  const statistics = monitor.statistics.map((path) => [...path]);
  const surprises = [...monitor.surprises];
  const notices: Notice[] = [];
  let change = monitor.change;
  let taken = 0;
  while (taken < newValues.length) {
    const value = newValues[taken++];
    const expected = expectedNext(state);
    appendValue(state, (value - state.reference.centre) / state.reference.scale);
    const isGap = Number.isNaN(value);
    const looking =
      !isGap && (state.looksUsed < monitor.looks || (change !== null && change.status === "provisional"));
    if (!looking) for (const path of statistics) path.push(null);
    else {
      state.looksUsed++;
      look(state);
      statistics.forEach((path, kind) => {
        // Adding zero keeps −0 out, which JSON would not bring back.
        path.push(Math.round(state.statistics[kind] * 1e4) / 1e4 + 0);
      });
      const next = judge(state, monitor, change);
      if (next !== null) {
        change = next;
        notices.push(next);
      }
    }
    if (!isGap && change === null) {
      const found = surpriseNotices(state, surprises, value, expected);
      notices.push(...found);
      for (const { index } of found) surprises.push(index);
    }
    if (isDone({ looks: monitor.looks, looksUsed: state.looksUsed, change })) break;
  }
  return {
    monitor: {
      ...monitor,
      values: [...monitor.values, ...toStored(newValues).slice(0, taken)],
      looksUsed: state.looksUsed,
      statistics,
      change,
      surprises,
    },
    notices,
    taken,
  };
}

/** Values that stand out and were not told of yet, in units of the series. */
function surpriseNotices(
  state: LookState,
  known: readonly number[],
  newestValue: number,
  newestExpected: number,
): SurpriseNotice[] {
  const { centre, scale } = state.reference;
  return findSurprises(state, (time) => known.includes(time)).map(({ time, size }) => {
    const newest = time === state.count - 1;
    const value = newest ? newestValue : centre + scale * state.values[time];
    const expected = newest ? centre + scale * newestExpected : value - scale * size;
    return { code: "surprise", index: time, value, expected, size };
  });
}

/** Brings a stored monitor back to work: the reference refitted with its order, its values taken in again. */
export function resume(monitor: Monitor, room: number): LookState {
  const reference = fitReference(fromStored(monitor.reference), monitor, monitor.order, monitor.order);
  const state = openLookState(reference, monitor.looks, monitor.values.length + room);
  for (const value of fromStored(monitor.values))
    appendValue(state, (value - reference.centre) / reference.scale);
  state.looksUsed = monitor.looksUsed;
  return state;
}

/** A notice if this look brings one: the first past a boundary, or the confirmation of an earlier one. */
function judge(state: LookState, monitor: Monitor, change: ChangeNotice | null): ChangeNotice | null {
  if (change === null) {
    let lead = -1;
    for (let kind = 0; kind < state.kinds.length; kind++) {
      const margin = state.statistics[kind] - monitor.boundaries[kind].boundary;
      if (margin >= 0 && (lead < 0 || margin > state.statistics[lead] - monitor.boundaries[lead].boundary))
        lead = kind;
    }
    if (lead < 0) return null;
    const { kind } = monitor.boundaries[lead];
    const passed = { kind, statistic: state.statistics[lead], look: state.looksUsed };
    return makeNotice(state, monitor, lead, passed, { status: "provisional", noticedAt: state.count - 1 });
  }
  if (change.status === "confirmed" || state.looksUsed < change.evidence.looksUsed + confirmAfter)
    return null;
  const lead = monitor.boundaries.findIndex(({ boundary }) => boundary === change.evidence.boundary);
  // A notice of an earlier version holds the same numbers, as its own.
  const { statistic, looksUsed: look } = change.evidence;
  const passed = change.evidence.passed ?? { kind: monitor.boundaries[lead].kind, statistic, look };
  return makeNotice(state, monitor, lead, passed, { status: "confirmed", noticedAt: change.noticedAt });
}

function makeNotice(
  state: LookState,
  monitor: Monitor,
  lead: number,
  passed: Passed,
  { status, noticedAt }: Pick<ChangeNotice, "status" | "noticedAt">,
): ChangeNotice {
  const statistic = state.statistics[lead];
  const named = nameChange(
    state,
    monitor.boundaries.map(({ boundary }) => boundary),
    status,
  );
  return {
    code: "change",
    kind: named.kind,
    alternative: named.alternative,
    status,
    noticedAt,
    change: { index: named.time, low: named.low, high: named.high },
    before: behaviourBefore(state, named.time),
    after: behaviourAfter(state, named),
    evidence: {
      statistic,
      boundary: monitor.boundaries[lead].boundary,
      looksUsed: state.looksUsed,
      looks: monitor.looks,
      passed,
      falseAlarmRate: monitor.falseAlarmRate,
      ...(hasClusters(state.reference) ? { caution: "clustered-shocks" } : {}),
    },
  };
}
