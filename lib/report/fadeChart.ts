import { area, line } from "d3-shape";
import { lastPersistenceChange } from "../words/changeWords.ts";
import type { SeriesFacts } from "../words/facts.ts";
import { toldFading } from "../words/fading.ts";
import { fadingWeights } from "../words/fadingWeights.ts";
import type { Speech } from "../words/speech.ts";
import { html, type Markup } from "./markup.ts";
import { heights, type LegendEntry, plot, round, side } from "./plot.ts";
import { spreadLabels } from "./timeline.ts";
import { verticalScale } from "./verticalScale.ts";

interface Curves {
  readonly now: readonly number[];
  readonly nowName: string;
  readonly before: readonly number[] | null;
  readonly beforeName: string;
  /** `null` when shocks do not fade; absent where the data cannot tell. */
  readonly halfLife?: number | null;
}

/**
 * What to compare: both sides of the last change of persistence, since the model over the whole past is a mixture of
 * them; without one, the model with the earlier model that it was compared with.
 */
function curvesOf(facts: SeriesFacts): Curves {
  const { model, comparison } = facts;
  const change = lastPersistenceChange(facts);
  const count = Math.max(2, Math.min(27, model.weights.length));
  if (change) {
    return {
      now: fadingWeights(change.after.coefficients, count),
      nowName: "since the change",
      before: fadingWeights(change.before.coefficients, count),
      beforeName: "before the change",
      halfLife: change.after.halfLife,
    };
  }
  const old = comparison?.coefficients.filter((one) => one.before !== null) ?? [];
  const coefficients = new Array<number>(Math.max(0, ...old.map((one) => one.lag))).fill(0);
  for (const one of old) coefficients[one.lag - 1] = one.before ?? 0;
  return {
    now: Array.from({ length: count }, (_, lag) => model.weights[lag] ?? 0),
    nowName: "now",
    before: old.length > 0 ? fadingWeights(coefficients, count) : null,
    beforeName: "model compared with",
    ...(toldFading(model).hasHalfLife ? { halfLife: model.halfLife } : {}),
  };
}

/** How much of a shock is left period by period, now and by the reference. */
export function fadeChart(id: string, speech: Speech): Markup {
  const { facts } = speech;
  const { period } = facts;
  const { now, nowName, before, beforeName, halfLife: half } = curvesOf(facts);
  const count = now.length;
  const { scale, ticks } = verticalScale([0, 1, ...now, ...(before ?? [])]);
  const x = (lag: number) => round((lag / (count - 1)) * side);
  const y = (value: number) => round(scale(value));
  const curve = line<number>((_, lag) => x(lag), y).digits(1);
  const under = area<number>(
    (_, lag) => x(lag),
    () => y(0),
    y,
  ).digits(1);
  const legend: LegendEntry[] = [
    { sample: "past", text: nowName },
    ...(before ? [{ sample: "reference", text: beforeName }] : []),
    { sample: "half", text: "one half left" },
  ];
  const halfWords =
    half === undefined
      ? "The data cannot tell when half is left."
      : half === null
        ? "It never falls to one half for good."
        : `Half is left after ${speech.span(half)}.`;
  return plot({
    id,
    title: `How a shock fades, by ${period}s after it`,
    description: `The share of a shock that is left. ${halfWords}`,
    height: heights.small,
    grid: "y",
    x: spreadLabels(count, (lag) => `${lag}`),
    y: ticks.map((tick) => ({ at: scale(tick) / side, text: speech.percent(Math.round(tick * 100)) })),
    body: [
      html`<path class="ebb" d="${under(now) ?? ""}"/>`,
      html`<path class="half" d="M0,${y(0.5)}H${side}"/>`,
      before ? html`<path class="reference" d="${curve(before) ?? ""}"/>` : html``,
      html`<path class="past" d="${curve(now) ?? ""}"/>`,
      typeof half === "number" && half <= count - 1
        ? html`<path class="dot" d="M${x(half)},${y(0.5)}h0"/>`
        : html``,
    ],
    legend,
    table: {
      caption: "how a shock fades",
      head: [`${period}s after`, `left, ${nowName}`, ...(before ? [`left, ${beforeName}`] : [])],
      rows: now.map((value, lag) => [
        `${lag}`,
        speech.percent(Math.round(value * 1000) / 10),
        ...(before ? [speech.percent(Math.round(before[lag] * 1000) / 10)] : []),
      ]),
    },
  });
}
