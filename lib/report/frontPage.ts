import { line } from "d3-shape";
import type { Ranked } from "../words/attention.ts";
import { percentWriter } from "../words/chances.ts";
import { changeHeadline } from "../words/changeWords.ts";
import type { RunFacts, Voice } from "../words/facts.ts";
import { staleSentence, surpriseSentence } from "../words/otherFindings.ts";
import { plainName } from "../words/plainText.ts";
import { type Speech, speechFor, spokenInterval } from "../words/speech.ts";
import { tableBefore } from "../words/tableBefore.ts";
import { html, type Markup, nothing } from "./markup.ts";
import { round } from "./plot.ts";
import { statusChip } from "./status.ts";
import { verticalScale } from "./verticalScale.ts";

/**
 * The front: every series of the run on one line each, what needs attention first. `linkOf` leads to a series' section;
 * `null` where it has none.
 */
export function frontPage(
  all: readonly Ranked[],
  linkOf: (index: number) => string | null,
  run: RunFacts,
  voice: Voice,
): Markup {
  if (all.length === 0) return html`<p>No table was read in this run.</p>`;
  const { level } = spokenInterval(all[0].facts.forecast.intervals);
  const several = run.tables.length > 1;
  return html`<nav class="front" aria-labelledby="all"><h2 id="all">All series, what needs attention first</h2>
<p class="hint">Recent past and forecast; under each number the range that is meant to hold it ${percentWriter(voice.locale)(level)} of the time.</p>
${linkOf(all.length - 1) === null ? html`<p class="hint">Lines that lead on have pictures; the full account of any other series is given by <code>explain</code>.</p>` : nothing}
<ol>${all.map((one, index) => row(one, linkOf(index), several, run, voice))}</ol>${untoldLine(run)}</nav>`;
}

/** Where a run has very many series, most of the steady ones are counted and not drawn. */
function untoldLine({ untold }: RunFacts): Markup {
  const count = (untold?.steady ?? 0) + (untold?.news ?? 0);
  return count === 0
    ? nothing
    : html`<p class="hint">And ${count} further series, ${untold?.steady ?? 0} of them steady: their numbers stand in the forecast files.</p>`;
}

function row(one: Ranked, link: string | null, several: boolean, run: RunFacts, voice: Voice): Markup {
  const speech = speechFor(one.facts, voice, run.asOf);
  const { forecast } = one.facts;
  const interval = spokenInterval(forecast.intervals);
  const told = (value: number) => speech.write(value, speech.forecastStep);
  const news = newsOf(one, speech);
  const table = several ? tableBefore(one.table.table, one.facts.series, 120) : null;
  const line = html`<span class="name">${table === null ? nothing : html`<small>${table}</small> `}${plainName(one.facts.series, 120)}</span>${statusChip(one)}${mini(one)}<span class="next"><b>${told(forecast.point[0])}</b> ${speech.unit ?? ""} <small>${told(interval.low[0])} to ${told(interval.high[0])}, ${speech.periods.name(forecast.periods[0])}</small></span>${news ? html`<span class="news">${news}</span>` : nothing}`;
  return link === null
    ? html`<li><div class="row">${line}</div></li>`
    : html`<li><a href="${link}">${line}</a></li>`;
}

function newsOf({ facts }: Ranked, speech: Speech): string | null {
  for (const finding of facts.findings) {
    if (finding.code === "change" && finding.fresh) return changeHeadline(finding, speech);
    if (finding.code === "surprise") return surpriseSentence(finding, speech);
    if (finding.code === "stale") return staleSentence(finding, speech);
  }
  return null;
}

/** The last 40 periods and the forecast, without axes; the words beside it say the same. */
function mini({ facts }: Ranked): Markup {
  const past = facts.history.values.slice(-40);
  const { point } = facts.forecast;
  const last = past.length + point.length - 1;
  const { scale } = verticalScale([...past, ...point]);
  const x = (index: number) => round((index / Math.max(1, last)) * 1000);
  const draw = line<number | null>(
    (_, index) => x(index),
    (value) => round(scale(value ?? 0)),
  )
    .defined((value) => value !== null)
    .digits(0);
  const coming = [...past.map((value, index) => (index === past.length - 1 ? value : null)), ...point];
  return html`<svg class="mini" viewBox="0 -40 1000 1080" preserveAspectRatio="none" aria-hidden="true"><path class="past" d="${draw([...past]) ?? ""}"/><path class="coming" d="${draw(coming) ?? ""}"/></svg>`;
}
