import { numberFormat } from "../words/formats.ts";
import type { Speech } from "../words/speech.ts";
import { statisticsWriter } from "../words/statistics.ts";
import { html, type Markup } from "./markup.ts";
import { heights, plot, round, side } from "./plot.ts";
import { verticalScale } from "./verticalScale.ts";

/** Residual autocorrelations with the band ±1.96/√n that white noise keeps to 95 % of the time. `null` without any. */
export function autocorrelationChart(id: string, speech: Speech, locale: string): Markup | null {
  const { residualAutocorrelations: all, observations } = speech.facts.model;
  const values = all.slice(0, 30);
  if (values.length === 0 || observations === 0) return null;
  const band = 1.96 / Math.sqrt(observations);
  const tell = statisticsWriter(locale);
  const { scale, ticks } = verticalScale([...values, -band * 1.3, band * 1.3]);
  const x = (lag: number) => round(((lag - 0.5) / values.length) * side);
  const y = (value: number) => round(scale(value));
  const outside = values.filter((value) => Math.abs(value) > band).length;
  const number = numberFormat(locale, { maximumFractionDigits: 2 });
  const every = Math.ceil(values.length / 6);
  return plot({
    id,
    title: "Left unexplained, by lag",
    description: `Autocorrelations of the residuals at ${values.length} lags; ${outside} outside the 95% band of ±${number.format(band)}, ${number.format(values.length * 0.05)} expected by chance.`,
    height: heights.small,
    grid: "y",
    x: values.flatMap((_, index) =>
      index % every === 0 ? [{ at: (index + 0.5) / values.length, text: `${index + 1}` }] : [],
    ),
    y: ticks.map((tick) => ({ at: scale(tick) / side, text: number.format(tick) })),
    body: [
      html`<path class="between" d="M0,${y(band)}H${side}V${y(-band)}H0Z"/>`,
      html`<path class="zero" d="M0,${y(0)}H${side}"/>`,
      ...values.map((value, index) => html`<path class="stem" d="M${x(index + 1)},${y(0)}V${y(value)}"/>`),
    ],
    legend: [
      { sample: "stem", text: "autocorrelation of residuals" },
      { sample: "between", text: "chance alone, 95%" },
    ],
    table: {
      caption: "residual autocorrelations",
      head: ["lag", "autocorrelation"],
      rows: values.map((value, index) => [`${index + 1}`, tell.signed(value)]),
    },
  });
}
