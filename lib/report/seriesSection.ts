import type { Ranked } from "../words/attention.ts";
import { changeDate, changeHeadline, changeMeaning } from "../words/changeWords.ts";
import type { RunFacts, Voice } from "../words/facts.ts";
import { chanceSentences, nextSentence, totalSentence } from "../words/forecastSentences.ts";
import { plainText } from "../words/plainText.ts";
import { remainderSentence } from "../words/remainder.ts";
import { seriesAccount } from "../words/seriesAccount.ts";
import { speechFor } from "../words/speech.ts";
import { statisticsWriter } from "../words/statistics.ts";
import { attributionChart } from "./attributionChart.ts";
import { autocorrelationChart } from "./autocorrelationChart.ts";
import { coefficientChart } from "./coefficientChart.ts";
import { fadeChart } from "./fadeChart.ts";
import { historyChart } from "./historyChart.ts";
import { html, type Markup, nothing } from "./markup.ts";
import { monitorCharts } from "./monitorChart.ts";
import { statusChip } from "./status.ts";
import { trackChart } from "./trackChart.ts";

/** Everything about one series: what to expect and what changed in words, then the pictures, then the account. */
export function seriesSection(one: Ranked, id: string, run: RunFacts, voice: Voice): Markup {
  const { facts, table } = one;
  const speech = speechFor(facts, voice, run.asOf);
  const account = seriesAccount(facts, speech, statisticsWriter(voice.locale), voice, false);
  const lead = [nextSentence(speech), totalSentence(speech), ...chanceSentences(speech)].filter(
    (text) => text !== "",
  );
  const changes = facts.findings.flatMap((finding) => {
    if (finding.code !== "change") return [];
    const rest = finding.kind === "persistence" ? remainderSentence(speech) : null;
    return [
      changeHeadline(finding, speech),
      [changeMeaning(finding, speech), rest].filter(Boolean).join(": "),
      changeDate(finding, speech),
    ];
  });
  const list = (texts: readonly string[]) =>
    texts.length > 0
      ? html`<ul class="said">${texts.map((text) => html`<li>${closed(text)}</li>`)}</ul>`
      : nothing;
  const pictures = [
    fadeChart(`${id}f`, speech),
    attributionChart(`${id}a`, speech),
    coefficientChart(`${id}c`, speech, voice.locale),
    ...(facts.monitor ? monitorCharts(`${id}m`, facts.monitor, speech, voice.locale) : []),
    autocorrelationChart(`${id}r`, speech, voice.locale),
    trackChart(`${id}t`, speech, voice.locale),
  ].flatMap((picture) => (picture ? [picture] : []));
  const accountLines = [...account.changes, ...account.model, ...account.comparison, ...account.watch];
  return html`<section id="${id}" class="series" aria-labelledby="${id}h">
<h2 id="${id}h"><span class="of">${plainText(table.table)}</span> ${speech.series} ${statusChip(one)}</h2>
${list([...changes.filter((text) => text !== ""), ...lead])}
${historyChart(`${id}p`, speech)}
<div class="pictures">${pictures}</div>
${list([...account.others, ...account.record])}
<details class="account"><summary>The analyst's account</summary><pre tabindex="0">${accountLines.join("\n")}</pre></details>
</section>`;
}

/** A sentence with a capital and a full stop. */
function closed(text: string): string {
  const start = text.charAt(0).toUpperCase() + text.slice(1);
  return /[.!?…]$/.test(start) ? start : `${start}.`;
}
