import type { Problem } from "../series/series.ts";
import type { RunFacts } from "../words/facts.ts";
import { plainName } from "../words/plainText.ts";
import { failureText, goneLines, list, problemText } from "../words/troubleLines.ts";
import { html, type Markup, nothing } from "./markup.ts";

/** Problems of one table that are written out; a broken file may have thousands of the same. */
const most = 20;

/** What is wrong in the data, table by table, with line, column and remedy; tables that failed come first. */
export function problemsSection(run: RunFacts): Markup {
  const tables = [
    ...run.failed.map((one) => ({ ...one, note: failureText(one) })),
    ...run.tables.map((one) => ({ ...one, note: "" })),
  ].filter((one) => one.problems.length > 0 || one.note !== "");
  const gone = goneLines(run);
  if (tables.length === 0 && run.left.length === 0 && gone.length === 0) return nothing;
  return html`<section class="troubles" aria-labelledby="troubles"><h2 id="troubles">Problems in the data</h2>
${run.left.length > 0 ? html`<p>Not reached before time ran out: ${list(run.left)}.</p>` : nothing}
${gone.map((line) => html`<p>${line}</p>`)}
${tables.map(({ table, note, problems }) => html`<h3>${plainName(table, 120)}${note === "" ? nothing : html` <small>${note}</small>`}</h3>${problemList(problems)}`)}
</section>`;
}

function problemList(problems: readonly Problem[]): Markup {
  const more = problems.length - most;
  return html`<ul>${problems.slice(0, most).map((one) => html`<li>${problemText(one)}</li>`)}${more > 0 ? html`<li>… and ${more} more.</li>` : nothing}</ul>`;
}
