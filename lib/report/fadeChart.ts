import { area, line } from "d3-shape";
import type { SeriesFacts } from "../words/facts.ts";
import type { Speech } from "../words/speech.ts";
import { html, type Markup } from "./markup.ts";
import { heights, type LegendEntry, plot, round, side } from "./plot.ts";
import { spreadLabels } from "./timeline.ts";
import { verticalScale } from "./verticalScale.ts";

/** Coefficients of the model a change or comparison is measured from, and how to name it; `null` without one. */
function referenceOf(facts: SeriesFacts): { coefficients: readonly number[]; name: string } | null {
  const change = facts.findings.findLast((one) => one.code === "change");
  if (change?.code === "change")
    return { coefficients: change.before.coefficients, name: "before the change" };
  const old = facts.comparison?.coefficients.filter((one) => one.before !== null) ?? [];
  if (!facts.comparison || old.length === 0) return null;
  const coefficients = new Array<number>(Math.max(...old.map((one) => one.lag))).fill(0);
  for (const one of old) coefficients[one.lag - 1] = one.before ?? 0;
  return { coefficients, name: "model compared with" };
}

/** Moving-average weights ψ_0.. of φ: ψ_j = Σ φ_i ψ_{j−i} (Brockwell and Davis 1991, section 3.3). */
export function fadingWeights(coefficients: readonly number[], count: number): number[] {
  const weights = [1];
  for (let lag = 1; lag < count; lag++) {
    let sum = 0;
    for (let back = 1; back <= Math.min(lag, coefficients.length); back++) {
      sum += coefficients[back - 1] * weights[lag - back];
    }
    weights.push(sum);
  }
  return weights.slice(0, count);
}

/** How much of a shock is left period by period, now and by the reference. */
export function fadeChart(id: string, speech: Speech): Markup {
  const { facts } = speech;
  const { model, period } = facts;
  const count = Math.max(2, Math.min(27, model.weights.length));
  const now = model.weights.slice(0, count);
  const reference = referenceOf(facts);
  const then = reference ? fadingWeights(reference.coefficients, now.length) : null;
  const { scale, ticks } = verticalScale([0, 1, ...now, ...(then ?? [])]);
  const x = (lag: number) => round((lag / (count - 1)) * side);
  const y = (value: number) => round(scale(value));
  const curve = line<number>((_, lag) => x(lag), y).digits(1);
  const under = area<number>(
    (_, lag) => x(lag),
    () => y(0),
    y,
  ).digits(1);
  const half = model.halfLife;
  const legend: LegendEntry[] = [
    { sample: "past", text: "now" },
    ...(reference ? [{ sample: "reference", text: reference.name }] : []),
    { sample: "half", text: "one half left" },
  ];
  const halfWords =
    half === null ? "It never falls to one half for good." : `Half is left after ${speech.span(half)}.`;
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
      then ? html`<path class="reference" d="${curve(then) ?? ""}"/>` : html``,
      html`<path class="past" d="${curve(now) ?? ""}"/>`,
      half !== null && half <= count - 1 ? html`<path class="dot" d="M${x(half)},${y(0.5)}h0"/>` : html``,
    ],
    legend,
    table: {
      caption: "how a shock fades",
      head: [`${period}s after`, "left now", ...(then ? ["left by the reference"] : [])],
      rows: now.map((value, lag) => [
        `${lag}`,
        speech.percent(Math.round(value * 1000) / 10),
        ...(then ? [speech.percent(Math.round(then[lag] * 1000) / 10)] : []),
      ]),
    },
  });
}
