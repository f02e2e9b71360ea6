import { periodIndex, periodStart } from "../series/periods.ts";
import type { Finding, SeriesFacts } from "./facts.ts";
import { fadingWeights } from "./fadingWeights.ts";
import { instantOf } from "./periods.ts";
import type { Speech } from "./speech.ts";
import { takesPart } from "./takesPart.ts";

type ChangeFinding = Extract<Finding, { code: "change" }>;

/** One past shock and what is left of it later, in the unit of the series. */
export interface Remainder {
  readonly period: string;
  /** How far the value lay above (or below) what was expected. */
  readonly shock: number;
  readonly later: { readonly period: string; readonly effect: number };
}

/**
 * A shock worth telling, and the first coming period in which half of it or less is left, else the last of the
 * forecast. It is the latest period's shock unless that was small (below half the usual size); then the one that
 * moves the forecast most; `null` when that is small too. A model of logarithms tells effects as shares; they are
 * turned into amounts against the value or forecast they act on: `amount = value · (1 − e^(−effect))`.
 *
 * With `coefficients`, those of one side of a change, the shock fades by them and not by the describing model, which
 * is a mixture of what was before and after. Without, it is `null` for a model that has no part in the forecast.
 */
export function remainderOf(facts: SeriesFacts, coefficients?: readonly number[]): Remainder | null {
  const { attribution, forecast, model } = facts;
  if (!coefficients && !takesPart(model)) return null;
  const latest = attribution?.shocks.find((one) => one.period === facts.lastPeriod);
  const told = [latest, attribution?.shocks[0]].find(
    (one) => one !== undefined && one.effects.length > 0 && Math.abs(one.shock) >= model.shockSize / 2,
  );
  if (!told) return null;
  const shares = model.scale === "log";
  const value = shares ? valueAt(facts, told.period) : 0;
  if (value === null) return null;
  const shock = shares ? value * -Math.expm1(-told.shock) : told.shock;
  const effects = coefficients
    ? laterEffects(
        shock,
        coefficients,
        periodIndex(told.period, facts.period, facts.lastPeriod),
        forecast.periods.length,
      )
    : told.effects.map((effect, step) => (shares ? forecast.point[step] * -Math.expm1(-effect) : effect));
  const found = effects.findIndex((effect) => Math.abs(effect) <= Math.abs(shock) / 2);
  const index = found === -1 ? effects.length - 1 : found;
  return { period: told.period, shock, later: { period: forecast.periods[index], effect: effects[index] } };
}

/** Effects on the coming periods of a shock that happened `age` periods before the last one. */
function laterEffects(
  shock: number,
  coefficients: readonly number[],
  age: number,
  horizon: number,
): number[] {
  return fadingWeights(coefficients, age + 1 + horizon)
    .slice(age + 1)
    .map((weight) => shock * weight);
}

function valueAt({ history, period }: SeriesFacts, start: string): number | null {
  return history.values[periodIndex(history.start, period, start)] ?? null;
}

/** "last week's" when it is just over, else "the" with the period named by `of`. */
function whose(speech: Speech, start: string): { before: string; after: string } {
  const { period } = speech.facts;
  const now = instantOf(speech.now);
  const justOver =
    now >= instantOf(periodStart(start, period, 1)) && now < instantOf(periodStart(start, period, 2));
  if (!justOver || period === "hour") return { before: "the", after: ` ${speech.periods.when(start)}` };
  return { before: period === "day" ? "yesterday's" : `last ${period}'s`, after: "" };
}

const saysSlower = ({ before, after }: ChangeFinding) =>
  (after.halfLife ?? Number.POSITIVE_INFINITY) > (before.halfLife ?? Number.POSITIVE_INFINITY);

/**
 * What is left in words. Of the same sign as the shock it adds or takes off; of the other sign it is no rest of the
 * shock but its swing back, and said as such: a shortfall that adds would read as an error.
 */
export function leftWords(shock: number, effect: number, left: string, when: string): string {
  if (effect * shock >= 0) return `still ${effect > 0 ? "adds" : "takes off"} about ${left} ${when}`;
  return effect > 0
    ? `is followed by a rebound, about ${left} more ${when}`
    : `is followed by a dip, about ${left} less ${when}`;
}

/**
 * "last week's surplus of 38 loans still adds about 19 in the week of 11 January", or `null` without such a shock.
 * With a change of persistence the shock fades as it does since the change; and `null` too when the change is to
 * slower fading but the shock will have faded.
 */
export function remainderSentence(speech: Speech, change?: ChangeFinding): string | null {
  const remainder = remainderOf(speech.facts, change?.after.coefficients);
  if (!remainder) return null;
  const { shock, later, period } = remainder;
  const size = speech.roughly(Math.abs(shock));
  const left = speech.roughNumber(Math.abs(later.effect));
  if (speech.roughNumber(Math.abs(shock)) === speech.write(0, 1)) return null;
  const { before, after } = whose(speech, period);
  const start = `${before} ${shock > 0 ? "surplus" : "shortfall"} of ${size}${after}`;
  if (Math.abs(later.effect) < Math.abs(shock) / 20)
    return change && saysSlower(change)
      ? null
      : `${start} will have faded by ${speech.periods.inText(later.period)}`;
  return `${start} ${leftWords(shock, later.effect, left, speech.periods.when(later.period))}`;
}
