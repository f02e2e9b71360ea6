import { type ScaleLinear, scaleLinear } from "d3-scale";
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
  readonly shape: "wide" | "small";
  readonly x: readonly AxisLabel[];
  readonly y: readonly AxisLabel[];
  readonly marks?: readonly Mark[];
  readonly body: readonly Markup[];
  readonly legend: readonly LegendEntry[];
  readonly table: NumbersTable;
}

/** A figure: picture, axis words, marks, legend, and the numbers behind it. */
export function plot(picture: Plot): Markup {
  const { id, title, description, shape, x, y, marks = [], body, legend, table } = picture;
  const gutter = Math.max(2, ...y.map((one) => [...one.text].length));
  return html`<figure class="plot ${shape}">
<figcaption>${title}</figcaption>
<div class="frame" style="--gutter:${gutter}ch">
${marks.length > 0 ? html`<div class="marks" aria-hidden="true">${marks.map(letter)}</div>` : nothing}
<div class="ys" aria-hidden="true">${y.map((one) => html`<span style="top:${percent(one.at)}">${one.text}</span>`)}</div>
<svg viewBox="0 0 ${side} ${side}" preserveAspectRatio="none" role="img" aria-labelledby="${id}t ${id}d"><title id="${id}t">${title}</title><desc id="${id}d">${description}</desc>${y.map(gridLine)}${body}</svg>
<div class="xs" aria-hidden="true">${x.map((one) => html`<span class="${anchor(one.at)}" style="left:${percent(one.at)}">${one.text}</span>`)}</div>
</div>
${legend.length > 0 ? html`<ul class="legend">${legend.map((one) => html`<li><i class="${one.sample}"></i>${one.text}</li>`)}</ul>` : nothing}
${marks.length > 0 ? html`<ol class="told">${marks.map((one) => html`<li>${one.text}</li>`)}</ol>` : nothing}
${numbersTable(table)}
</figure>`;
}

const percent = (share: number) => `${Math.round(share * 1000) / 10}%`;
const anchor = (at: number) => (at < 0.08 ? "from" : at > 0.92 ? "to" : "mid");

function gridLine(label: AxisLabel): Markup {
  const at = Math.round(label.at * side);
  return html`<path class="grid" d="M0,${at}H${side}"/>`;
}

function letter(mark: Mark, index: number): Markup {
  return html`<b class="${anchor(mark.at)}" style="left:${percent(mark.at)};top:${index % 2 === 0 ? "0" : "1.3em"}">${String.fromCharCode(65 + index)}</b>`;
}

/** A vertical scale over all given values with a little air, its ticks, and the decimal place their labels need. */
export function verticalScale(
  values: readonly (number | null | undefined)[],
  ticks = 4,
): { scale: ScaleLinear<number, number>; ticks: readonly number[]; place: number } {
  const present = values.filter(
    (value): value is number => typeof value === "number" && Number.isFinite(value),
  );
  let low = present.length > 0 ? Math.min(...present) : 0;
  let high = present.length > 0 ? Math.max(...present) : 1;
  if (low === high) {
    const air = Math.abs(low) / 10 || 1;
    low -= air;
    high += air;
  }
  const scale = scaleLinear([low, high], [side, 0]).nice(ticks);
  const at = scale.ticks(ticks);
  const step = at.length > 1 ? at[1] - at[0] : 1;
  return { scale, ticks: at, place: Math.min(1, 10 ** Math.floor(Math.log10(step) + 1e-9)) };
}

/** One decimal is finer than any screen, and keeps the page small. */
export const round = (value: number) => Math.round(value * 10) / 10;
