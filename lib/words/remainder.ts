import type { SeriesFacts } from "./facts.ts";
import { addPeriods, instantOf } from "./periods.ts";
import type { Speech } from "./speech.ts";

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
 */
export function remainderOf(facts: SeriesFacts): Remainder | null {
  const { attribution, forecast, model } = facts;
  const latest = attribution?.shocks.find((one) => one.period === facts.lastPeriod);
  const told = [latest, attribution?.shocks[0]].find(
    (one) => one !== undefined && one.effects.length > 0 && Math.abs(one.shock) >= model.shockSize / 2,
  );
  if (!told) return null;
  const found = told.effects.findIndex((effect) => Math.abs(effect) <= Math.abs(told.shock) / 2);
  const index = found === -1 ? told.effects.length - 1 : found;
  const later = { period: forecast.periods[index], effect: told.effects[index] };
  if (model.scale === "raw") return { period: told.period, shock: told.shock, later };
  const value = valueAt(facts, told.period);
  if (value === null) return null;
  return {
    period: told.period,
    shock: value * -Math.expm1(-told.shock),
    later: { period: later.period, effect: forecast.point[index] * -Math.expm1(-later.effect) },
  };
}

function valueAt({ history, period }: SeriesFacts, start: string): number | null {
  const index = history.values.findIndex((_, at) => addPeriods(history.start, period, at) === start);
  return index === -1 ? null : history.values[index];
}

/** "last week's" when it is just over, else "the" with the period named by `of`. */
function whose(speech: Speech, start: string): { before: string; after: string } {
  const { period } = speech.facts;
  const now = instantOf(speech.now);
  const justOver =
    now >= instantOf(addPeriods(start, period, 1)) && now < instantOf(addPeriods(start, period, 2));
  if (!justOver || period === "hour") return { before: "the", after: ` ${speech.periods.when(start)}` };
  return { before: period === "day" ? "yesterday's" : `last ${period}'s`, after: "" };
}

/**
 * "last week's surplus of 38 loans still adds about 19 in the week of 11 January", or `null` without such a shock.
 * With `lasting`, `null` also when it will have faded: for a sentence that says that shocks stay.
 */
export function remainderSentence(speech: Speech, lasting = false): string | null {
  const remainder = remainderOf(speech.facts);
  if (!remainder) return null;
  const { shock, later, period } = remainder;
  const size = speech.roughly(Math.abs(shock));
  const left = speech.roughNumber(Math.abs(later.effect));
  if (speech.roughNumber(Math.abs(shock)) === speech.write(0, 1)) return null;
  const { before, after } = whose(speech, period);
  const start = `${before} ${shock > 0 ? "surplus" : "shortfall"} of ${size}${after}`;
  const when = speech.periods.when(later.period);
  if (Math.abs(later.effect) < Math.abs(shock) / 20)
    return lasting ? null : `${start} will have faded by ${speech.periods.inText(later.period)}`;
  return `${start} still ${later.effect > 0 ? "adds" : "takes off"} about ${left} ${when}`;
}
