import { newsFrom, ranked } from "../words/attention.ts";
import type { RunFacts, Voice } from "../words/facts.ts";
import { headline } from "../words/headline.ts";
import { frontPage } from "./frontPage.ts";
import { html, type Markup, nothing } from "./markup.ts";
import { page } from "./page.ts";
import { problemsSection } from "./problemsSection.ts";
import { seriesSection } from "./seriesSection.ts";

/** Characters of series sections a page may hold: far below 15 MB, so that a phone opens it at once. */
const budget = 4_000_000;

/** Series that are drawn whatever they show; beyond them only those with news, for nobody leafs through hundreds. */
const mostSteadyDrawn = 100;

/**
 * The report of a run: `report.html`, the front over all series with the first sections, and `report-2.html` and so
 * on when one page would grow too large. Of more than a hundred series the steady ones beyond have their line on the
 * front alone. Each page is one self-contained file without script or network.
 */
export function renderReport(run: RunFacts, voice: Voice): { key: string; html: string }[] {
  const all = ranked(run);
  const pages: Markup[][] = [[]];
  const pageOf: number[] = [];
  let size = 0;
  const drawn = all.filter((one, index) => index < mostSteadyDrawn || one.attention >= newsFrom);
  drawn.forEach((one, index) => {
    const section = seriesSection(one, `s${index + 1}`, run, voice);
    if (size > 0 && size + section.markup.length > budget) {
      pages.push([]);
      size = 0;
    }
    pages[pages.length - 1].push(section);
    pageOf.push(pages.length - 1);
    size += section.markup.length;
  });
  const key = (number: number) => (number === 0 ? "report.html" : `report-${number + 1}.html`);
  // Those with news come first, so the places of the drawn are their places in the whole.
  const linkOf = (index: number) =>
    index < drawn.length ? `${pageOf[index] === 0 ? "" : key(pageOf[index])}#s${index + 1}` : null;
  return pages.map((sections, number) => {
    const others =
      pages.length > 1
        ? html`<p class="pages">Page ${number + 1} of ${pages.length}: ${pages.map((_, other) => (other === number ? html`<b>${other + 1}</b> ` : html`<a href="${key(other)}">${other + 1}</a> `))}</p>`
        : nothing;
    const front = number === 0 ? frontPage(all, linkOf, run, voice) : nothing;
    return {
      key: key(number),
      html: page(
        headline(run),
        html`${others}${front}${sections}${number === 0 ? problemsSection(run) : nothing}${others}`,
        run,
        voice,
      ),
    };
  });
}
