import type { Speech } from "../words/speech.ts";
import { html, type Markup } from "./markup.ts";
import { heights, plot, round, side } from "./plot.ts";
import { spreadLabels } from "./timeline.ts";
import { verticalScale } from "./verticalScale.ts";

const named = 3;

/** Where the forecast comes from: what each past shock still adds to, or takes from, every coming period. */
export function attributionChart(id: string, speech: Speech): Markup | null {
  const { attribution, forecast, model } = speech.facts;
  if (!attribution || attribution.shocks.length === 0) return null;
  const inShares = model.scale === "log";
  const told = (value: number) =>
    inShares ? speech.percent(Math.round(Math.expm1(value) * 100)) : speech.roughNumber(value);
  const { shocks } = attribution;
  const rest = shocks.slice(named);
  const groups = [
    ...shocks.slice(0, named).map((one) => ({
      name: `${speech.periods.name(one.period)} (${one.shock > 0 ? "+" : ""}${told(one.shock)})`,
      effects: one.effects,
    })),
    ...(rest.length > 0
      ? [
          {
            name: `${rest.length} other ${speech.facts.period}s`,
            effects: forecast.periods.map((_, step) =>
              rest.reduce((sum, one) => sum + (one.effects[step] ?? 0), 0),
            ),
          },
        ]
      : []),
  ];
  const steps = forecast.periods.length;
  const stacks = forecast.periods.map((_, step) => {
    let above = 0;
    let below = 0;
    return groups.map(({ effects }) => {
      const effect = effects[step] ?? 0;
      const from = effect >= 0 ? above : below;
      if (effect >= 0) above += effect;
      else below += effect;
      return { from, to: from + effect };
    });
  });
  const { scale, ticks, place } = verticalScale([0, ...stacks.flat().map((one) => one.to)]);
  const y = (value: number) => round(scale(value));
  const width = (side / steps) * 0.7;
  const left = (index: number) => round((side / steps) * (index + 0.15));
  const unit = inShares ? "in percent" : speech.unit === null ? "" : `in ${speech.unit}`;
  return plot({
    id,
    title: `Past shocks in the forecast, ${unit}`.replace(/, $/, ""),
    description: `How far each of ${shocks.length} past shocks moves the coming ${steps} ${speech.facts.period}s away from the long-run level of ${speech.roughly(attribution.longRunLevel)}.`,
    height: heights.small,
    grid: "y",
    x: spreadLabels(steps, (index) => speech.periods.short(forecast.periods[index]), 3).map((one) => ({
      ...one,
      at: (one.at * (steps - 1) + 0.5) / steps,
    })),
    y: ticks.map((tick) => ({
      at: scale(tick) / side,
      text: inShares ? speech.percent(Math.round(tick * 100)) : speech.write(tick, place),
    })),
    body: [
      ...stacks.flatMap((stack, index) =>
        stack.map(
          ({ from, to }, group) =>
            html`<path class="part part${group + 1}" d="M${left(index)},${y(from)}h${round(width)}V${y(to)}h-${round(width)}Z"/>`,
        ),
      ),
      html`<path class="zero" d="M0,${y(0)}H${side}"/>`,
    ],
    legend: groups.map((group, index) => ({ sample: `part part${index + 1}`, text: group.name })),
    table: {
      caption: "what past shocks add",
      head: ["shock of", "size", ...forecast.periods.map((one) => speech.periods.short(one))],
      rows: shocks.map((one) => [speech.periods.name(one.period), told(one.shock), ...one.effects.map(told)]),
    },
  });
}
