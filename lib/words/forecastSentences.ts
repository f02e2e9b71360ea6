import type { SeriesFacts } from "./facts.ts";
import { allWhole, roundingStep } from "./numbers.ts";
import { anOrA, countOf } from "./spans.ts";
import { sparkline } from "./sparkline.ts";
import { type Speech, spokenInterval } from "./speech.ts";

/** "about 185 loans in the week of 7 December (155 to 210)". */
export function nextSentence(speech: Speech): string {
  const { forecast } = speech.facts;
  const interval = spokenInterval(forecast.intervals);
  const step = speech.forecastStep;
  return `about ${speech.amount(forecast.point[0], step)} ${speech.periods.when(forecast.periods[0])} ${range(speech, interval.low[0], interval.high[0], step)}`;
}

/** Whether the forecast's periods may be added up: there are several, and they are amounts rather than levels. */
export const hasTotal = ({ forecast, adds }: SeriesFacts) => forecast.periods.length > 1 && adds !== false;

/** "about 1,400 over all 8 weeks (1,000 to 1,800)"; empty where a total means nothing. */
export function totalSentence(speech: Speech): string {
  const { forecast, period, history } = speech.facts;
  if (!hasTotal(speech.facts)) return "";
  const interval = spokenInterval(forecast.total.intervals);
  const step = roundingStep(interval.high - interval.low, allWhole(history.values));
  const periods = countOf(forecast.periods.length, period, speech.write);
  return `about ${speech.write(forecast.total.point, step)} over all ${periods} ${range(speech, interval.low, interval.high, step)}`;
}

function range(speech: Speech, low: number, high: number, step: number): string {
  return `(${speech.write(low, step)} to ${speech.write(high, step)})`;
}

/** Past periods in the small bars of a note. */
export const barsPast = 12;
const barsToCome = 8;

/** The small bars of a note: the last twelve periods, then up to eight to come. */
export function bars({ facts }: Speech): string {
  return sparkline(facts.history.values.slice(-barsPast), facts.forecast.point.slice(0, barsToCome));
}

/** "24 weeks past | 8 to come: ▁▂▃|▄▅". */
export function sparkSentence(speech: Speech, past: number): string {
  const { forecast, history, period } = speech.facts;
  const values = history.values.slice(-past);
  const drawn = sparkline(values, forecast.point);
  const gaps = values.includes(null) ? ", · no figure" : "";
  return `${countOf(values.length, period, speech.write)} past | ${speech.write(forecast.point.length, 1)} to come${gaps}: ${drawn}`;
}

/** "about 30% chance of a week above 260 loans by the week of 25 January", one for each limit set. */
export function chanceSentences(speech: Speech): string[] {
  const { forecast, period } = speech.facts;
  const last = forecast.periods.at(-1);
  if (last === undefined) return [];
  return forecast.chances.map(({ direction, limit, any }) => {
    const time =
      forecast.periods.length === 1 ? speech.periods.when(last) : `by ${speech.periods.inText(last)}`;
    return `${speech.chance(any)} chance of ${anOrA(period)} ${period} ${direction} ${speech.amount(limit, limitStep(limit))} ${time}`;
  });
}

/** A limit is told as it was set, to at most six decimals. */
export const limitStep = (limit: number) =>
  Number.isInteger(limit) ? 1 : 10 ** -Math.min(6, decimals(limit));

const decimals = (value: number) => `${value}`.split(".")[1]?.length ?? 0;
