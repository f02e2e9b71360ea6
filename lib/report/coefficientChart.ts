import type { Speech } from "../words/speech.ts";
import { statisticsWriter } from "../words/statistics.ts";
import { html, type Markup } from "./markup.ts";
import { plot, round, side } from "./plot.ts";
import { horizontalScale } from "./verticalScale.ts";

/** Two standard errors to each side hold a normal estimate about 95 % of the time. */
const reach = 1.96;
/** Lags with a row of their own; the table under the picture has them all. */
const most = 12;

/** Each coefficient with its 95 % interval now, and where the earlier model had it. `null` without coefficients. */
export function coefficientChart(id: string, speech: Speech, locale: string): Markup | null {
  const { model, comparison } = speech.facts;
  const before = new Map(comparison?.coefficients.map((one) => [one.lag, one.before]) ?? []);
  const count = Math.max(model.order, 0, ...before.keys());
  if (count === 0) return null;
  const all = Array.from({ length: count }, (_, index) => {
    const value = model.coefficients[index] ?? null;
    const error = model.standardErrors[index] ?? null;
    const arm = error === null || !Number.isFinite(error) ? 0 : reach * error;
    return {
      lag: index + 1,
      value,
      error,
      low: (value ?? 0) - arm,
      high: (value ?? 0) + arm,
      before: before.get(index + 1) ?? null,
    };
  });
  const rows = all.slice(0, most);
  const { scale, ticks, place } = horizontalScale([
    0,
    ...rows.flatMap((one) => [one.low, one.high, one.before]),
  ]);
  const tell = statisticsWriter(locale);
  const x = (value: number) => round(scale(value));
  const y = (index: number) => round(((index + 0.5) / rows.length) * side);
  const lift = 140 / rows.length;
  const compared = rows.some((one) => one.before !== null);
  const cut = count > most ? ` (first ${most} of ${count} lags)` : "";
  return plot({
    id,
    title: `Coefficients, now and before${cut}`,
    description: `${count === 1 ? "1 coefficient" : `${count} coefficients`} with 95% intervals${compared ? ", beside those of the earlier model" : ""}.`,
    height: Math.max(4, rows.length * 1.7),
    grid: "x",
    x: ticks.map((tick) => ({ at: scale(tick) / side, text: speech.write(tick, place) })),
    y: rows.map((one, index) => ({ at: y(index) / side, text: `lag ${one.lag}` })),
    body: [
      html`<path class="zero" d="M${x(0)},0V${side}"/>`,
      ...rows.flatMap(({ value, low, high, before: old }, index) => [
        ...(value === null
          ? []
          : [
              html`<path class="whisker" d="M${x(low)},${round(y(index) - lift)}H${x(high)}"/>`,
              html`<path class="dot" d="M${x(value)},${round(y(index) - lift)}h0"/>`,
            ]),
        ...(old === null ? [] : [html`<path class="dot old" d="M${x(old)},${round(y(index) + lift)}h0"/>`]),
      ]),
    ],
    legend: [
      { sample: "dot", text: "now, with 95% interval" },
      ...(compared ? [{ sample: "dot old", text: "model compared with" }] : []),
    ],
    table: {
      caption: "coefficients",
      head: ["lag", "before", "now", "standard error"],
      rows: all.map((one) => [
        `${one.lag}`,
        tell.coefficient(one.before),
        tell.coefficient(one.value),
        tell.coefficient(one.error),
      ]),
    },
  });
}
