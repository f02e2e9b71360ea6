import { line } from "d3-shape";
import type { Ranked } from "../words/attention.ts";
import { percentWriter } from "../words/chances.ts";
import { changeHeadline } from "../words/changeWords.ts";
import type { RunFacts, Voice } from "../words/facts.ts";
import { surpriseSentence } from "../words/otherFindings.ts";
import { plainText } from "../words/plainText.ts";
import { type Speech, speechFor, spokenInterval } from "../words/speech.ts";
import { troubleLines } from "../words/troubleLines.ts";
import { html, type Markup, nothing } from "./markup.ts";
import { round, verticalScale } from "./plot.ts";
import { statusChip } from "./status.ts";

/** The front: every series of the run on one line each, what needs attention first, and what went wrong. */
export function frontPage(
  all: readonly Ranked[],
  linkOf: (index: number) => string,
  run: RunFacts,
  voice: Voice,
): Markup {
  const troubles = troubleLines(run, 40);
  const level =
    all.length > 0 ? percentWriter(voice.locale)(spokenInterval(all[0].facts.forecast.intervals).level) : "";
  return html`${troubles.length > 0 ? html`<section class="troubles" aria-labelledby="troubles"><h2 id="troubles">Needs a look in the data</h2><ul>${troubles.map((text) => html`<li>${text}</li>`)}</ul></section>` : nothing}
${all.length > 0 ? html`<nav class="front" aria-labelledby="all"><h2 id="all">All series, what needs attention first</h2><p class="hint">Each with its recent past and the forecast; a range is meant to hold the figure ${level} of the time.</p><ol>${all.map((one, index) => row(one, linkOf(index), run, voice))}</ol></nav>` : html`<p>No table was read in this run.</p>`}`;
}

function row(one: Ranked, link: string, run: RunFacts, voice: Voice): Markup {
  const speech = speechFor(one.facts, voice, run.asOf);
  const { forecast } = one.facts;
  const interval = spokenInterval(forecast.intervals);
  const told = (value: number) => speech.write(value, speech.forecastStep);
  const news = newsOf(one, speech);
  return html`<li><a href="${link}"><span class="name"><small>${plainText(one.table.table)}</small> ${speech.series}</span>${statusChip(one)}${mini(one)}<span class="next"><b>${told(forecast.point[0])}</b> ${speech.unit ?? ""} <small>${told(interval.low[0])} to ${told(interval.high[0])}, ${speech.periods.name(forecast.periods[0])}</small></span>${news ? html`<span class="news">${news}</span>` : nothing}</a></li>`;
}

function newsOf({ facts }: Ranked, speech: Speech): string | null {
  const change = facts.findings.find((one) => one.code === "change" && one.fresh);
  if (change?.code === "change") return changeHeadline(change, speech);
  const surprise = facts.findings.find((one) => one.code === "surprise");
  return surprise?.code === "surprise" ? surpriseSentence(surprise, speech) : null;
}

/** The last 40 periods and the forecast, without axes. */
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
