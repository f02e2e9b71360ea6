import { line } from "d3-shape";
import type { Speech } from "../words/speech.ts";
import { statisticsWriter } from "../words/statistics.ts";
import { html, type Markup } from "./markup.ts";
import { heights, plot, round, side } from "./plot.ts";
import { spreadLabels } from "./timeline.ts";
import { verticalScale } from "./verticalScale.ts";

/** What earlier forecasts were worth: the typical miss by how far ahead, against repeating the past. */
export function trackChart(id: string, speech: Speech, locale: string): Markup | null {
  const { trackRecord: record, period } = speech.facts;
  if (!record || record.byHorizon.length < 2) return null;
  const steps = record.byHorizon;
  const tell = statisticsWriter(locale);
  const { scale, ticks, place } = verticalScale([
    0,
    ...steps.flatMap((one) => [one.meanAbsoluteError, one.naiveMeanAbsoluteError]),
  ]);
  const x = (index: number) => round((index / (steps.length - 1)) * side);
  const y = (value: number) => round(scale(value));
  const curve = (values: readonly number[]) =>
    line<number>((_, index) => x(index), y).digits(1)([...values]) ?? "";
  const inUnit = speech.unit === null ? "" : `, in ${speech.unit}`;
  return plot({
    id,
    title: `Typical miss by ${period}s ahead${inUnit}`,
    description: `Mean absolute error of ${record.forecasts} forecasts by how far ahead they looked, ours and by repeating the past.`,
    height: heights.small,
    grid: "y",
    x: spreadLabels(steps.length, (index) => `${steps[index].step}`),
    y: ticks.map((tick) => ({ at: scale(tick) / side, text: speech.write(tick, place) })),
    body: [
      html`<path class="reference" d="${curve(steps.map((one) => one.naiveMeanAbsoluteError))}"/>`,
      html`<path class="past" d="${curve(steps.map((one) => one.meanAbsoluteError))}"/>`,
    ],
    legend: [
      { sample: "past", text: "these forecasts" },
      { sample: "reference", text: "repeating the past" },
    ],
    table: {
      caption: "track record",
      head: [
        `${period}s ahead`,
        "forecasts",
        `inside the ${speech.percent(record.level)} range`,
        "typical miss",
        "repeating the past",
      ],
      rows: steps.map((one) => [
        `${one.step}`,
        speech.write(one.forecasts, 1),
        speech.write(one.insideRange, 1),
        tell.size(one.meanAbsoluteError),
        tell.size(one.naiveMeanAbsoluteError),
      ]),
    },
  });
}
