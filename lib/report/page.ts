import type { RunFacts, Voice } from "../words/facts.ts";
import { falseNotices } from "../words/falseNotices.ts";
import { timeWriter } from "../words/instants.ts";
import { caution } from "../words/note.ts";
import { html, type Markup } from "./markup.ts";
import { style } from "./style.ts";

const policy = "default-src 'none'; style-src 'unsafe-inline'; img-src data:";

/** The document around the sections: head, title with the tide line, the caution at its foot. */
export function page(title: string, main: Markup, run: RunFacts, voice: Voice): string {
  return `<!doctype html>\n${
    html`<html lang="en"><head><meta charset="utf-8"><meta http-equiv="Content-Security-Policy" content="${{ markup: policy }}"><meta name="viewport" content="width=device-width, initial-scale=1"><meta name="color-scheme" content="light dark"><meta name="referrer" content="no-referrer"><title>${title}</title><style>${{ markup: style }}</style></head>
<body><header><p class="mark">ebbwire</p>${tide}<h1>${title}</h1><p class="when">${timeWriter(voice)(run.asOf)} (${voice.timeZone})</p></header>
<main>${main}</main>
<footer><p>${falseNotices(run, voice)}</p><p>${caution}</p></footer></body></html>`.markup
  }\n`;
}

/** A wave that ebbs away to a level: the name's idea, and what the pages are about. */
const tide: Markup = html`<svg class="tide" viewBox="0 0 600 60" preserveAspectRatio="none" aria-hidden="true"><path d="${wave()}"/></svg>`;

function wave(): string {
  const points = Array.from({ length: 121 }, (_, index) => {
    const height = 30 - 26 * Math.exp(-index / 34) * Math.cos(index / 4.2);
    return `${index * 5},${Math.round(height * 10) / 10}`;
  });
  return `M${points.join("L")}`;
}
