/** A piece of HTML or SVG that is safe to stand in the page as it is. Only `html` makes one. */
export interface Markup {
  readonly markup: string;
}

type Part = string | number | Markup | readonly Markup[] | null;

const entities: Record<string, string> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "'": "&#39;",
};

/** The one escape function of the report: right for text and for quoted attribute values. */
export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => entities[character]);
}

/**
 * Template for markup: every value put in is escaped, unless it is markup itself. `null` leaves nothing.
 *
 * @example html`<b>${"a < b"}</b>`.markup // "<b>a &lt; b</b>"
 */
export function html(texts: TemplateStringsArray, ...parts: readonly Part[]): Markup {
  let markup = texts[0];
  parts.forEach((part, index) => {
    markup += written(part) + texts[index + 1];
  });
  return { markup };
}

function written(part: Part): string {
  if (part === null) return "";
  if (typeof part === "string" || typeof part === "number") return escapeHtml(`${part}`);
  return "markup" in part ? part.markup : part.map((one) => one.markup).join("");
}

export const nothing: Markup = { markup: "" };
