import { roundingStep } from "./numbers.ts";
import { countOf } from "./spans.ts";
import { sparkline } from "./sparkline.ts";
import { type Speech, spokenInterval } from "./speech.ts";

/** "about 157 loans in the week of 7 December (range 118 to 203)". */
export function nextSentence(speech: Speech): string {
  const { forecast } = speech.facts;
  const interval = spokenInterval(forecast.intervals);
  const step = speech.forecastStep;
  return `about ${speech.amount(forecast.point[0], step)} ${speech.periods.when(forecast.periods[0])} ${range(speech, interval.low[0], interval.high[0], step)}`;
}

/** "about 1,240 in the 8 weeks to come (range 1,050 to 1,460)"; empty with one period only. */
export function totalSentence(speech: Speech): string {
  const { forecast, period, history } = speech.facts;
  if (forecast.periods.length < 2) return "";
  const interval = spokenInterval(forecast.total.intervals);
  const whole = history.values.every((value) => value === null || Number.isInteger(value));
  const step = roundingStep(interval.high - interval.low, whole);
  const periods = countOf(forecast.periods.length, period, speech.write);
  return `all ${periods} together about ${speech.write(forecast.total.point, step)} ${range(speech, interval.low, interval.high, step)}`;
}

function range(speech: Speech, low: number, high: number, step: number): string {
  return `(range ${speech.write(low, step)} to ${speech.write(high, step)})`;
}

/** "16 weeks past | 8 to come: ▁▂▃|▄▅". */
export function sparkSentence(speech: Speech, past = 16): string {
  const { forecast, history, period } = speech.facts;
  const values = history.values.slice(-past);
  const drawn = sparkline(values, forecast.point);
  const gaps = values.includes(null) ? ", · no figure" : "";
  return `${countOf(values.length, period, speech.write)} past | ${speech.write(forecast.point.length, 1)} to come${gaps}: ${drawn}`;
}

/** "about 20% chance of a week above 420 loans by the week of 25 January", one for each limit set. */
export function chanceSentences(speech: Speech): string[] {
  const { forecast, period } = speech.facts;
  const last = forecast.periods.at(-1);
  if (last === undefined) return [];
  return forecast.chances.map(({ direction, limit, any }) => {
    const step = Number.isInteger(limit) ? 1 : 10 ** -Math.min(6, decimals(limit));
    const times =
      forecast.periods.length === 1 ? speech.periods.when(last) : `by ${speech.periods.inText(last)}`;
    return `${speech.chance(any)} chance of ${period === "hour" ? "an" : "a"} ${period} ${direction} ${speech.amount(limit, step)} ${times}`;
  });
}

const decimals = (value: number) => `${value}`.split(".")[1]?.length ?? 0;
