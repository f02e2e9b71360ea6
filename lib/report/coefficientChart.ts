import { numberFormat } from "../words/formats.ts";
import type { Speech } from "../words/speech.ts";
import { statisticsWriter } from "../words/statistics.ts";
import { html, type Markup } from "./markup.ts";
import { plot, round, side, verticalScale } from "./plot.ts";

/** Two standard errors to each side hold a normal estimate about 95 % of the time. */
const reach = 1.96;

/** Each coefficient with its 95 % interval now, and where the reference had it. `null` without coefficients. */
export function coefficientChart(id: string, speech: Speech, locale: string): Markup | null {
  const { model, comparison } = speech.facts;
  const tell = statisticsWriter(locale);
  const before = new Map(comparison?.coefficients.map((one) => [one.lag, one.before]) ?? []);
  const count = Math.min(26, Math.max(model.order, ...[...before.keys()]));
  if (count === 0) return null;
  const rows = Array.from({ length: count }, (_, index) => {
    const value = model.coefficients[index] ?? null;
    const error = model.standardErrors[index] ?? null;
    return {
      lag: index + 1,
      value,
      low: value !== null && error !== null ? value - reach * error : value,
      high: value !== null && error !== null ? value + reach * error : value,
      before: before.get(index + 1) ?? null,
      error,
    };
  });
  const { scale, ticks, place } = verticalScale([
    0,
    ...rows.flatMap((one) => [one.low, one.high, one.before]),
  ]);
  const x = (lag: number) => round(((lag - 0.5) / count) * side);
  const y = (value: number) => round(scale(value));
  const shift = Math.min(14, 120 / count);
  const every = Math.ceil(count / 8);
  const number = numberFormat(locale, { maximumFractionDigits: place < 0.1 ? 2 : 1 });
  return plot({
    id,
    title: "Coefficients by lag, now and before",
    description: `${count} coefficients with 95% intervals; ${rows.filter((one) => one.before !== null).length} of them can be compared with the earlier model.`,
    shape: "small",
    x: rows
      .filter((_, index) => index % every === 0)
      .map((one) => ({ at: (one.lag - 0.5) / count, text: `${one.lag}` })),
    y: ticks.map((tick) => ({ at: scale(tick) / side, text: number.format(tick) })),
    body: [
      html`<path class="zero" d="M0,${y(0)}H${side}"/>`,
      ...rows.map(
        ({ lag, value, low, high, before: old }) =>
          html`${
            low !== null && high !== null
              ? html`<path class="whisker" d="M${x(lag) + shift},${y(low)}V${y(high)}"/>`
              : html``
          }${value !== null ? html`<path class="dot" d="M${x(lag) + shift},${y(value)}h0"/>` : html``}${
            old !== null ? html`<path class="dot old" d="M${x(lag) - shift},${y(old)}h0"/>` : html``
          }`,
      ),
    ],
    legend: [
      { sample: "dot", text: "now, with 95% interval" },
      ...(before.size > 0 ? [{ sample: "dot old", text: "model compared with" }] : []),
    ],
    table: {
      caption: "coefficients",
      head: ["lag", "before", "now", "standard error"],
      rows: rows.map((one) => [
        `${one.lag}`,
        tell.coefficient(one.before),
        tell.coefficient(one.value),
        tell.coefficient(one.error),
      ]),
    },
  });
}
