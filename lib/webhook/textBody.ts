import { fitLines } from "./fitLines.ts";
import type { Message } from "./message.ts";
import { breakLinks, zeroWidthSpace } from "./plainText.ts";

const budgetBytes = 3_500;
/** A space hardly seen; a mark of emphasis before any space opens nothing. */
const hairSpace = "\u200a";

/**
 * The `{ text }` body. Receivers read it as anything from plain text to full Markdown and agree on no escape but
 * that of `& < >`, so marks are made harmless in themselves: emphasis by a hair space after its sign (not inside a
 * word, which no dialect reads as emphasis), code by another sign, headings and quotations by a space of no width
 * before them, links and mentions by one within. The footer is ours and keeps its links.
 */
export function textBody(message: Message): string {
  return fitLines(
    message,
    ({ title, lines, footer }) => {
      const parts = [harmless(title), ...lines.map(harmless), footer === "" ? "" : escaped(footer)];
      return JSON.stringify({ text: parts.join("\n").trimEnd() });
    },
    (body) => Buffer.byteLength(body) <= budgetBytes,
  );
}

function harmless(line: string): string {
  return escaped(breakLinks(line.replace(/^(?=\s*[#>])/, zeroWidthSpace)))
    .replace(/[*~](?=\S)/g, `$&${hairSpace}`)
    .replace(/(?<![\p{L}\p{N}])_(?=\S)|(?<=[\p{L}\p{N}])_(?![\p{L}\p{N}\s]|$)/gu, `_${hairSpace}`)
    .replaceAll("`", "\u02cb")
    .replaceAll("](", `]${zeroWidthSpace}(`);
}

function escaped(text: string): string {
  return text.replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll(">", "&gt;");
}
