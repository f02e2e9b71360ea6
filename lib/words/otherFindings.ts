import { periodStart } from "../series/periods.ts";
import type { Finding } from "./facts.ts";
import { significantStep } from "./numbers.ts";
import { leftWords } from "./remainder.ts";
import { countOf } from "./spans.ts";
import type { Speech } from "./speech.ts";
import { takesPart } from "./takesPart.ts";

type Of<Code extends Finding["code"]> = Extract<Finding, { code: Code }>;

/** "212 loans in the week of 30 November, about 60 more than expected: a one-off so far, not a lasting change". */
export function surpriseSentence(finding: Of<"surprise">, speech: Speech): string {
  const difference = finding.value - finding.expected;
  const value = speech.amount(finding.value, valueStep(finding.value));
  const than = difference >= 0 ? "more" : "less";
  return `${value} ${speech.periods.when(finding.period)}, about ${speech.roughNumber(Math.abs(difference))} ${than} than expected: a one-off so far, not a lasting change`;
}

/** A remainder below this share of the surprise is not worth planning for. */
const faded = 0.1;

/**
 * What is left of a surprise in the first coming period that is known, and from when it hardly matters; `null` when
 * nothing is known of the periods to come, or the model that knows has no part in the forecast.
 */
export function surpriseRemainder(finding: Of<"surprise">, speech: Speech): string | null {
  const { inText, when } = speech.periods;
  const shock = finding.value - finding.expected;
  const small = faded * Math.abs(shock);
  const [next, ...later] = finding.remaining.filter((one) => one.period >= speech.facts.forecast.periods[0]);
  if (!next || !takesPart(speech.facts.model)) return null;
  if (Math.abs(next.amount) < small) return `it will have all but faded by ${inText(next.period)}`;
  const gone = later.find((one) => Math.abs(one.amount) < small);
  const end = gone ? ` and has all but faded by ${inText(gone.period)}` : "";
  const left = speech.roughNumber(Math.abs(next.amount));
  return `if nothing else happens it ${leftWords(shock, next.amount, left, when(next.period))}${end}`;
}

/** Observed values are told as they were recorded, to at most six digits. */
export const valueStep = (value: number) => (Number.isInteger(value) ? 1 : significantStep(value, 6, false));

/** "no new figures since the week of 16 November: 2 weeks late". */
export function staleSentence(finding: Of<"stale">, speech: Speech): string {
  const late = countOf(finding.periodsLate, speech.facts.period, speech.write);
  return `no new figures since ${speech.periods.inText(finding.lastPeriod)}, ${late} late; the forecast grows stale`;
}

export function noNewValuesSentence(finding: Of<"no-new-values">, speech: Speech): string {
  return `no new figures since ${speech.periods.inText(finding.since)}; the earlier forecast stands`;
}

/** "3 past figures were revised; the largest: week of 9 November from 140 to 152 loans". */
export function revisedSentence(finding: Of<"revised">, speech: Speech): string {
  const { before, after, period } = finding.largest;
  const told = (value: number) => speech.amount(value, valueStep(value));
  const from =
    before === null ? "no figure" : after === null ? told(before) : speech.write(before, valueStep(before));
  const to = after === null ? "no figure" : told(after);
  const many =
    finding.count === 1
      ? "1 past figure was revised"
      : `${speech.write(finding.count, 1)} past figures were revised`;
  return `${many}: ${finding.count === 1 ? "" : "the largest, "}${speech.periods.name(period)}, from ${from} to ${to}`;
}

export function incompleteSentence(finding: Of<"incomplete-period">, speech: Speech): string {
  return `${speech.periods.name(finding.period)} is not over yet and was left out`;
}

export function gapsSentence(finding: Of<"gaps">, speech: Speech): string {
  const { period } = speech.facts;
  if (finding.count === 1) return `1 ${period} has no figure: ${speech.periods.name(finding.latest)}`;
  return `${countOf(finding.count, period, speech.write)} have no figure, the latest ${speech.periods.name(finding.latest)}`;
}

export function pastBreakSentence(finding: Of<"past-break">, speech: Speech): string {
  const before = speech.write(finding.levelBefore, significantStep(finding.levelBefore, 3, false));
  const after = speech.amount(finding.levelAfter, significantStep(finding.levelAfter, 3, false));
  return `in the past the usual level moved from about ${before} to about ${after}, around ${speech.periods.inText(finding.change.period)}`;
}

export function eventSentence(finding: Of<"event-effect">, name: string, speech: Speech): string {
  const size = speech.roughly(Math.abs(finding.effect));
  const unsure = Math.abs(finding.effect) < 2 * finding.standardError ? ", though that could be chance" : "";
  return `"${name}" ${finding.effect < 0 ? "takes off" : "adds"} about ${size}${unsure}`;
}

/** "fair adds about 510 loans in the week of 14 December, counted in above"; `null` when none is ahead. */
export function comingEventSentence(
  finding: Of<"event-effect">,
  name: string,
  speech: Speech,
): string | null {
  const next = finding.coming[0];
  if (!next || next.amount === 0) return null;
  const what = next.amount < 0 ? "takes off" : "adds";
  return `"${name}" ${what} about ${speech.roughly(Math.abs(next.amount))} ${speech.periods.when(next.period)}; it is counted in`;
}

/** What the forecaster decided that a reader should know; `null` for what concerns analysts alone. */
export function forecastNoteSentence(finding: Of<"forecast-note">, speech: Speech): string | null {
  const { note } = finding;
  const { facts } = speech;
  switch (note.code) {
    case "too-short":
      return `only ${figures(note.observed, speech)} so far, so the forecast is a simple one`;
    case "constant":
      return `${sameFigures(note.observed, speech)} ${speech.amount(note.value, valueStep(note.value))}, so the forecast repeats it`;
    case "zeros-first":
      return `for the forecast, the zeros before ${speech.periods.inText(periodAt(note.index, speech))} are left out, as from before it began`;
    case "mostly-gaps":
      return `only ${figures(note.observed, speech)} in ${countOf(note.periods, facts.period, speech.write)}, so the forecast is a simple one`;
    case "intermittent":
      return `${speech.percent(Math.round(note.shareOfZeros * 100))} of the figures are zero, so the forecast is an average rate`;
    case "naive-used":
      return "no model beat repeating the past here, so the forecast does just that";
    case "level-step":
      return `for the forecast, figures before ${speech.periods.inText(periodAt(note.index, speech))} count for less: the level may have stepped there`;
    case "outliers-damped":
      return `${figures(note.indexes.length, speech)} far from the rest ${note.indexes.length === 1 ? "counts" : "count"} for less`;
  }
}

function sameFigures(last: number | undefined, speech: Speech): string {
  return last === undefined || last >= speech.facts.observed
    ? "every figure so far is"
    : `the last ${figures(last, speech)} are all`;
}

const figures = (count: number, speech: Speech) => countOf(count, "figure", speech.write);

/** The period of the value at `index` of the whole series, whose last value is at `lastPeriod`. */
function periodAt(index: number, speech: Speech): string {
  const { observed, gaps, lastPeriod, period } = speech.facts;
  return periodStart(lastPeriod, period, index - (observed + gaps - 1));
}
