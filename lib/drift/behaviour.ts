import { halfLife } from "../dynamics/halfLife.ts";
import { explain, openExplainer, setChange } from "./explain.ts";
import type { LookState } from "./lookState.ts";
import type { NamedChange } from "./nameChange.ts";
import type { Behaviour, ChangeKind } from "./notice.ts";

/** The reference in the units of the series; its level is that of the centreline at `time`, season apart. */
export function behaviourBefore(state: LookState, time: number): Behaviour {
  const { reference, terms, start, order } = state;
  const line = reference.trend ? reference.centreline[1] * state.termRows[time * terms + 1] : 0;
  return describe(
    reference.coefficients.subarray(terms),
    reference.centre + reference.scale * (reference.centreline[0] + line),
    reference.trend ? (reference.scale * reference.centreline[1]) / start : 0,
    reference.scale,
    start - order,
  );
}

/**
 * The behaviour since a named change: the reference with the parameters of the best set of kinds moved to
 * their posterior mode given all values since, so that a few values after the change do not make wild numbers
 * and what did not change keeps its estimate.
 */
export function behaviourAfter(state: LookState, named: NamedChange): Behaviour {
  const { best } = named;
  const { columns, terms, reference, start, count } = state;
  const before = behaviourBefore(state, named.time);
  const explainer = openExplainer(state);
  const { plan, solution } = explainer;
  const chosen = plan.columnsOf(best.kinds);
  setChange(explainer, named.time);
  explain(explainer, chosen, best.logRatio);
  const moved = (kind: ChangeKind): number[] => {
    const index = state.kinds.indexOf(kind);
    if (index < 0 || !(best.kinds & (1 << index))) return [];
    return Array.from(plan.priors[index], (_, i) => {
      const place = chosen.findIndex(({ column }) => column === plan.first[index] + i);
      return solution[columns + place];
    });
  };
  const [level = 0] = moved("level");
  const [slope = 0] = moved("trend");
  const persistence = moved("persistence");
  const coefficients = Float64Array.from(
    reference.coefficients.subarray(terms),
    (value, lag) => value + (persistence[lag] ?? 0),
  );
  let observed = 0;
  for (let time = named.time; time < count; time++) if (!state.isGap[time]) observed++;
  return describe(
    coefficients,
    before.level + reference.scale * level,
    before.slope + (reference.scale * slope) / start,
    before.shockSize * Math.exp(best.logRatio),
    observed,
  );
}

function describe(
  coefficients: Float64Array,
  level: number,
  slope: number,
  shockSize: number,
  observations: number,
): Behaviour {
  const life = halfLife(coefficients);
  return {
    order: coefficients.length,
    coefficients: [...coefficients],
    persistence: coefficients.reduce((sum, value) => sum + value, 0),
    halfLife: Number.isFinite(life) ? life : null,
    level,
    slope,
    shockSize,
    observations,
  };
}
