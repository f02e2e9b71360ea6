import { newsFrom, type Ranked } from "../words/attention.ts";
import { html, type Markup } from "./markup.ts";

/** What a series is, in one word with a shape of its own, so that colour is never the only sign. */
export function statusOf({ facts, attention }: Ranked): { readonly code: string; readonly text: string } {
  const has = (code: string) => facts.findings.some((one) => one.code === code);
  const fresh = facts.findings.some((one) => one.code === "change" && one.fresh);
  if (fresh) return { code: "changed", text: "changed" };
  if (has("stale")) return { code: "late", text: "late" };
  if (has("surprise")) return { code: "surprised", text: "surprise" };
  if (attention >= newsFrom) return { code: "limit", text: "limit" };
  return { code: "steady", text: "steady" };
}

export function statusChip(one: Ranked): Markup {
  const { code, text } = statusOf(one);
  return html`<span class="chip ${code}">${text}</span>`;
}
