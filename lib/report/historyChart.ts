import { area, line } from "d3-shape";
import type { SeriesFacts } from "../words/facts.ts";
import { limitStep } from "../words/forecastSentences.ts";
import { roundingStep } from "../words/numbers.ts";
import { valueStep } from "../words/otherFindings.ts";
import type { Speech } from "../words/speech.ts";
import { eventsOf } from "./historyEvents.ts";
import { html, type Markup } from "./markup.ts";
import { heights, type LegendEntry, plot, round, side } from "./plot.ts";
import { type Timeline, timelineLabels, timelineOf } from "./timeline.ts";
import { verticalScale } from "./verticalScale.ts";

/** The past, and the forecast fanning out of it; changes, surprises and limits are marked. */
export function historyChart(id: string, speech: Speech): Markup {
  const { facts, periods, write } = speech;
  const { forecast } = facts;
  const timeline = timelineOf(facts);
  const { starts, past, now } = timeline;
  const last = starts.length - 1;
  const x = (index: number) => round((index / last) * side);
  const limits = forecast.chances.map((one) => one.limit);
  const values = [
    ...past,
    ...forecast.point,
    ...limits,
    ...forecast.intervals.flatMap((one) => [...one.low, ...one.high]),
  ];
  const { scale, ticks, place } = verticalScale(values);
  const y = (value: number) => round(scale(value));
  const widest = [...forecast.intervals].sort((one, other) => other.level - one.level);
  const join = past.at(-1) ?? null;
  const fan = widest.map((interval, index) => {
    const edges = interval.low.map((low, step) => ({ at: now + step, low, high: interval.high[step] }));
    if (join !== null) edges.unshift({ at: now - 1, low: join, high: join });
    const path = area<(typeof edges)[number]>(
      (one) => x(one.at),
      (one) => y(one.low),
      (one) => y(one.high),
    ).digits(1)(edges);
    return html`<path class="fan fan${index === 0 ? "1" : "2"}" d="${path ?? ""}"/>`;
  });
  const pastLine = line<number | null>(
    (_, index) => x(index),
    (value) => y(value ?? 0),
  )
    .defined((value) => value !== null)
    .digits(1)([...past]);
  const coming = [
    ...(join === null ? [] : [{ at: now - 1, value: join }]),
    ...forecast.point.map((value, step) => ({ at: now + step, value })),
  ];
  const comingLine = line<(typeof coming)[number]>(
    (one) => x(one.at),
    (one) => y(one.value),
  ).digits(1)(coming);
  const events = eventsOf(speech, timeline);
  return plot({
    id,
    title: `${speech.series}: past and forecast${speech.unit === null ? "" : `, in ${speech.unit}`}`,
    description: description(speech, timeline),
    height: heights.wide,
    grid: "y",
    x: timelineLabels(starts, periods),
    y: ticks.map((tick) => ({ at: scale(tick) / side, text: write(tick, place) })),
    marks: events.map((one) => one.mark),
    body: [
      ...events.map((one) => one.shape(x)),
      ...fan,
      ...limits.map((limit) => html`<path class="limit" d="M0,${y(limit)}H${side}"/>`),
      html`<path class="now" d="M${x(now - 0.5)},0V${side}"/>`,
      html`<path class="past" d="${pastLine ?? ""}"/>`,
      ...lonely(past).map((index) => html`<path class="dot" d="M${x(index)},${y(past[index] ?? 0)}h0"/>`),
      html`<path class="coming" d="${comingLine ?? ""}"/>`,
      ...events.flatMap((one) =>
        one.value === null ? [] : [html`<path class="dot surprise" d="M${x(one.index)},${y(one.value)}h0"/>`],
      ),
    ],
    legend: legend(facts, widest, speech),
    table: table(speech, timeline),
  });
}

/** Values with a gap on both sides, which a line would not show. */
function lonely(past: readonly (number | null)[]): number[] {
  return past.flatMap((value, index) =>
    value !== null && (past[index - 1] ?? null) === null && (past[index + 1] ?? null) === null ? [index] : [],
  );
}

function legend(
  facts: SeriesFacts,
  widest: SeriesFacts["forecast"]["intervals"],
  speech: Speech,
): LegendEntry[] {
  const limits = facts.forecast.chances.map((one) => ({
    sample: "limit",
    text: `limit ${one.direction} ${speech.write(one.limit, limitStep(one.limit))}`,
  }));
  return [
    { sample: "past", text: "past" },
    { sample: "coming", text: "forecast" },
    ...widest.map((one, index) => ({
      sample: `fan fan${index === 0 ? "1" : "2"}`,
      text: `holds ${speech.percent(one.level)} of outcomes`,
    })),
    ...limits,
  ];
}

function description(speech: Speech, { starts, past, now }: Timeline): string {
  const present = past.filter((value) => value !== null);
  const { name } = speech.periods;
  if (present.length === 0) return "No past figures.";
  const told = (value: number) => speech.amount(value, valueStep(value));
  return `Past figures from ${name(starts[0])} to ${name(starts[now - 1])}, between ${told(Math.min(...present))} and ${told(Math.max(...present))}; then the forecast to ${name(starts[starts.length - 1])}.`;
}

function table(speech: Speech, { starts, past, now }: Timeline) {
  const { forecast, history } = speech.facts;
  const whole = history.values.every((value) => value === null || Number.isInteger(value));
  const recent = Math.max(0, past.length - 26);
  return {
    caption: "past and forecast",
    head: [
      "period",
      "value",
      "forecast",
      ...forecast.intervals.flatMap((one) => [
        `${speech.percent(one.level)} low`,
        `${speech.percent(one.level)} high`,
      ]),
    ],
    rows: starts.slice(recent).map((start, offset) => {
      const index = recent + offset;
      const name = speech.periods.name(start);
      const blanks = forecast.intervals.flatMap(() => ["", ""]);
      if (index < now) {
        const value = past[index];
        return [name, value === null ? "no figure" : speech.write(value, valueStep(value)), "", ...blanks];
      }
      const step = index - now;
      const finest = roundingStep(forecast.intervals[0].high[step] - forecast.intervals[0].low[step], whole);
      const told = (value: number) => speech.write(value, finest);
      return [
        name,
        "",
        told(forecast.point[step]),
        ...forecast.intervals.flatMap((one) => [told(one.low[step]), told(one.high[step])]),
      ];
    }),
  };
}
