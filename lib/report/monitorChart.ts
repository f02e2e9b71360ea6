import { line } from "d3-shape";
import type { MonitorFacts } from "../words/facts.ts";
import { numberFormat } from "../words/formats.ts";
import type { Speech } from "../words/speech.ts";
import { statisticsWriter } from "../words/statistics.ts";
import { html, type Markup } from "./markup.ts";
import { heights, plot, round, side } from "./plot.ts";
import { verticalScale } from "./verticalScale.ts";

const names = {
  persistence: "Persistence",
  level: "Level",
  trend: "Trend",
  "shock-size": "Shock size",
  season: "Season",
} as const;

/** One small picture for each kind of change that is watched: its statistic look by look against its boundary. */
export function monitorCharts(id: string, monitor: MonitorFacts, speech: Speech, locale: string): Markup[] {
  return monitor.paths.map((path, index) => monitorChart(`${id}${index}`, path, monitor, speech, locale));
}

function monitorChart(
  id: string,
  { kind, boundary, statistics }: MonitorFacts["paths"][number],
  monitor: MonitorFacts,
  speech: Speech,
  locale: string,
): Markup {
  const tell = statisticsWriter(locale);
  const { scale, ticks, place } = verticalScale([0, boundary * 1.15, ...statistics], 3);
  const x = (look: number) => round((look / Math.max(1, monitor.looks - 1)) * side);
  const y = (value: number) => round(scale(value));
  const path = line<number | null>(
    (_, look) => x(look),
    (value) => y(value ?? 0),
  )
    .defined((value) => value !== null)
    .digits(1)([...statistics]);
  const last = statistics.findLastIndex((value) => value !== null);
  const latest = last === -1 ? null : statistics[last];
  const crossed = statistics.findIndex((value) => value !== null && value >= boundary);
  const verdict = crossed === -1 ? "It has stayed below." : `It passed it at look ${crossed + 1}.`;
  const number = numberFormat(locale, { maximumFractionDigits: place < 1 ? 1 : 0 });
  return plot({
    id,
    title: `${names[kind]}: watched statistic by look`,
    description: `${statistics.length} of ${monitor.looks} looks; boundary ${tell.size(boundary)}${latest === null ? "" : `, latest ${tell.size(latest)}`}. ${verdict}`,
    height: heights.small,
    grid: "y",
    x: [
      { at: 0, text: "look 1" },
      { at: 1, text: speech.write(monitor.looks, 1) },
    ],
    y: ticks.map((tick) => ({ at: scale(tick) / side, text: number.format(tick) })),
    body: [
      html`<path class="boundary" d="M0,${y(boundary)}H${side}"/>`,
      html`<path class="past" d="${path ?? ""}"/>`,
      latest === null
        ? html``
        : html`<path class="dot${latest >= boundary ? " surprise" : ""}" d="M${x(last)},${y(latest)}h0"/>`,
    ],
    legend: [
      { sample: "past", text: "statistic" },
      { sample: "boundary", text: "boundary: a notice beyond it" },
    ],
    table: {
      caption: `${names[kind].toLowerCase()}, look by look`,
      head: ["look", "statistic", "boundary"],
      rows: statistics.map((value, look) => [
        `${look + 1}`,
        value === null ? "–" : tell.size(value),
        tell.size(boundary),
      ]),
    },
  });
}
