import { html, type Markup, nothing } from "./markup.ts";
import { type NumbersTable, numbersTable } from "./numbersTable.ts";

// The picture itself is stretched to whatever width there is, with strokes that keep their width; all words stand
// around it as HTML of fixed size. So a phone and a wide screen read equally well, without any script.

/** Side of the square that every picture is drawn in before it is stretched. */
export const side = 1000;

/** A word beside an axis; `at` runs from 0 (left, top) to 1 (right, bottom). */
export interface AxisLabel {
  readonly at: number;
  readonly text: string;
  /** Left out on a narrow screen. */
  readonly spare?: boolean;
}

/** A letter above the picture that the list under it explains. */
export interface Mark {
  readonly at: number;
  readonly text: string;
}

export interface LegendEntry {
  /** Class of the sample, the same as that of the shape it explains. */
  readonly sample: string;
  readonly text: string;
}

export interface Plot {
  /** Unique on its page. */
  readonly id: string;
  readonly title: string;
  /** What is seen, for those who cannot see it. */
  readonly description: string;
  /** Height of the picture, in rem. */
  readonly height: number;
  /** Which axis has lines across the picture. */
  readonly grid: "x" | "y";
  readonly x: readonly AxisLabel[];
  readonly y: readonly AxisLabel[];
  /** In the order of `at`. */
  readonly marks?: readonly Mark[];
  readonly body: readonly Markup[];
  readonly legend: readonly LegendEntry[];
  readonly table: NumbersTable;
}

/** Heights that most pictures share, in rem. */
export const heights = { wide: 16, small: 11 } as const;

/** A figure: picture, axis words, marks, legend, and the numbers behind it. */
export function plot(picture: Plot): Markup {
  const { id, title, description, height, grid, x, y, marks = [], body, legend, table } = picture;
  const gutter = Math.max(2, ...y.map((one) => [...one.text].length));
  const rows = markRows(marks);
  const lines =
    grid === "y"
      ? y.map(({ at }) => html`<path class="grid" d="M0,${round(at * side)}H${side}"/>`)
      : x.map(({ at }) => html`<path class="grid" d="M${round(at * side)},0V${side}"/>`);
  return html`<figure class="plot">
<figcaption>${title}</figcaption>
<div class="frame" style="--gutter:${gutter}ch;--height:${height}rem">
${rows.length > 0 ? html`<div class="marks" style="height:${(Math.max(...rows) + 1) * 1.4}em" aria-hidden="true">${marks.map((mark, index) => letter(mark, index, rows[index]))}</div>` : nothing}
<div class="body"><div class="ys" aria-hidden="true">${y.map((one) => html`<span style="top:${percent(one.at)}">${one.text}</span>`)}</div>
<svg viewBox="0 0 ${side} ${side}" preserveAspectRatio="none" role="img" aria-labelledby="${id}t ${id}d"><title id="${id}t">${title}</title><desc id="${id}d">${description}</desc>${lines}${body}</svg></div>
<div class="xs" aria-hidden="true">${x.map((one) => html`<span class="${anchor(one.at)}${one.spare ? " more" : ""}" style="left:${percent(one.at)}">${one.text}</span>`)}</div>
</div>
${legend.length > 0 ? html`<ul class="legend">${legend.map((one) => html`<li><i class="${one.sample}"></i>${one.text}</li>`)}</ul>` : nothing}
${marks.length > 0 ? html`<ol class="told">${marks.map((one) => html`<li>${one.text}</li>`)}</ol>` : nothing}
${numbersTable(table)}
</figure>`;
}

const percent = (share: number) => `${Math.round(share * 1000) / 10}%`;
const anchor = (at: number) => (at < 0.08 ? "from" : at > 0.92 ? "to" : "mid");

/** Letters stand in the first row where the one before is at least this share of the width away. */
const apart = 0.08;

function markRows(marks: readonly Mark[]): number[] {
  const ends: number[] = [];
  return marks.map(({ at }) => {
    const free = ends.findIndex((end) => at - end >= apart);
    const row = free === -1 ? ends.length : free;
    ends[row] = at;
    return row;
  });
}

function letter(mark: Mark, index: number, row: number): Markup {
  return html`<b class="${anchor(mark.at)}" style="left:${percent(mark.at)};top:${row * 1.4}em">${String.fromCharCode(65 + index)}</b>`;
}

/** One decimal is finer than any screen, and keeps the page small. */
export const round = (value: number) => Math.round(value * 10) / 10;
