import type { Ranked } from "../words/attention.ts";
import { changeDate, changeHeadline, changeMeaning } from "../words/changeWords.ts";
import type { RunFacts, SeriesFacts, Voice } from "../words/facts.ts";
import { plainName } from "../words/plainText.ts";
import { seriesAccount } from "../words/seriesAccount.ts";
import { type Speech, speechFor } from "../words/speech.ts";
import { statisticsWriter } from "../words/statistics.ts";
import { tableBefore } from "../words/tableBefore.ts";
import { takesPart } from "../words/takesPart.ts";
import { attributionChart } from "./attributionChart.ts";
import { autocorrelationChart } from "./autocorrelationChart.ts";
import { coefficientChart } from "./coefficientChart.ts";
import { fadeChart } from "./fadeChart.ts";
import { historyChart } from "./historyChart.ts";
import { html, type Markup, nothing } from "./markup.ts";
import { monitorCharts } from "./monitorChart.ts";
import { statusChip } from "./status.ts";
import { tiles } from "./tiles.ts";
import { trackChart } from "./trackChart.ts";

/** Everything about one series: the numbers to plan with, what changed, then the pictures, then the account. */
export function seriesSection(one: Ranked, id: string, run: RunFacts, voice: Voice): Markup {
  const { facts, table } = one;
  const speech = speechFor(facts, voice, run.asOf);
  const account = seriesAccount(facts, speech, statisticsWriter(voice.locale), voice, false);
  const group = (title: string, pictures: readonly (Markup | null)[]) => {
    const drawn = pictures.flatMap((picture) => (picture ? [picture] : []));
    return drawn.length > 0 ? html`<h3>${title}</h3><div class="pictures">${drawn}</div>` : nothing;
  };
  const of = run.tables.length > 1 ? tableBefore(table.table, facts.series, 120) : null;
  const carries = takesPart(facts.model);
  const lines = [...account.changes, ...account.model, ...account.comparison, ...account.watch];
  return html`<section id="${id}" class="series" aria-labelledby="${id}h">
<h2 id="${id}h">${of === null ? nothing : html`<span class="of">${of}</span> `}${plainName(facts.series, 120)} ${statusChip(one)}</h2>
${tiles(speech)}
${list([...changesOf(facts, speech), ...account.others])}
${historyChart(`${id}p`, speech)}
${list(account.record)}
${carries ? nothing : list(["The model that describes how shocks fade has no part to speak of in the forecast"])}
${group(carries ? "What carries the forecast" : "How shocks fade, and how earlier forecasts did", [fadeChart(`${id}f`, speech), carries ? attributionChart(`${id}a`, speech) : null, trackChart(`${id}t`, speech, voice.locale)])}
${group("The watch for change", facts.monitor ? monitorCharts(`${id}m`, facts.monitor, speech, voice.locale) : [])}
${group("The model", [coefficientChart(`${id}c`, speech, voice.locale), autocorrelationChart(`${id}r`, speech, voice.locale)])}
<details class="account"><summary>The analyst's account</summary><pre tabindex="0" role="group" aria-label="The analyst's account of ${speech.series}">${lines.join("\n")}</pre></details>
<p class="back"><a href="report.html#all">All series</a></p>
</section>`;
}

/** Every change that is known, the newest last: what, what it means, and since when. */
function changesOf(facts: SeriesFacts, speech: Speech): string[] {
  return facts.findings.flatMap((finding) =>
    finding.code === "change"
      ? [`${changeHeadline(finding, speech)}; ${changeDate(finding, speech)}`, changeMeaning(finding, speech)]
      : [],
  );
}

function list(texts: readonly string[]): Markup {
  const said = [...new Set(texts)].filter((text) => text !== "");
  return said.length > 0
    ? html`<ul class="said">${said.map((text) => html`<li>${closed(text)}</li>`)}</ul>`
    : nothing;
}

/** A sentence with a capital and a full stop. */
function closed(text: string): string {
  const start = text.charAt(0).toUpperCase() + text.slice(1);
  return /[.!?…]$/.test(start) ? start : `${start}.`;
}
