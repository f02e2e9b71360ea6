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
 * The latest shock and the first coming period in which half of it or less is left, else the last of the forecast.
 * A model of logarithms tells effects as shares; they are turned into amounts against the value or forecast they
 * act on: `amount = value · (1 − e^(−effect))`. `null` when nothing is known of the latest period's shock.
 */
export function remainderOf(facts: SeriesFacts): Remainder | null {
  const latest = facts.attribution?.shocks.find((one) => one.period === facts.lastPeriod);
  if (!latest || latest.effects.length === 0) return null;
  const found = latest.effects.findIndex((effect) => Math.abs(effect) <= Math.abs(latest.shock) / 2);
  const index = found === -1 ? latest.effects.length - 1 : found;
  const later = { period: facts.forecast.periods[index], effect: latest.effects[index] };
  if (facts.model.scale === "raw") return { period: latest.period, shock: latest.shock, later };
  const value = facts.history.values.at(-1);
  if (value === null || value === undefined) return null;
  return {
    period: latest.period,
    shock: value * -Math.expm1(-latest.shock),
    later: { period: later.period, effect: facts.forecast.point[index] * -Math.expm1(-later.effect) },
  };
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

/** "last week's surplus of 38 loans still adds about 19 in the week of 11 January", or `null` without such a shock. */
export function remainderSentence(speech: Speech): string | null {
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
    return `${start} will have faded by ${speech.periods.inText(later.period)}`;
  return `${start} still ${later.effect > 0 ? "adds" : "takes off"} about ${left} ${when}`;
}
