import { html, type Markup } from "./markup.ts";

/** The numbers behind a picture. */
export interface NumbersTable {
  readonly caption: string;
  readonly head: readonly string[];
  /** The first cell of a row names it. */
  readonly rows: readonly (readonly string[])[];
}

/** A closed drawer under a picture: its numbers as a table that can be read, copied and scrolled within itself. */
export function numbersTable({ caption, head, rows }: NumbersTable): Markup {
  return html`<details><summary>Numbers: ${caption}</summary><div class="scroll" tabindex="0" role="group" aria-label="${caption}"><table><thead><tr>${head.map((cell) => html`<th scope="col">${cell}</th>`)}</tr></thead><tbody>${rows.map(row)}</tbody></table></div></details>`;
}

function row([name, ...cells]: readonly string[]): Markup {
  return html`<tr><th scope="row">${name}</th>${cells.map((cell) => html`<td>${cell}</td>`)}</tr>`;
}
