import { fitLines } from "./fitLines.ts";
import type { Message } from "./message.ts";
import { breakLinks, zeroWidthSpace } from "./plainText.ts";

/** Of the text itself, in UTF-16 units, which is never less than what a receiver counts. */
const budgetCharacters = 2_000;

/**
 * The `{ content, allowed_mentions }` body: Markdown with backslash escapes, and no mention allowed whatever the
 * text says. The footer is ours and keeps its links.
 */
export function contentBody(message: Message): string {
  const content = fitLines(
    message,
    ({ title, lines, footer }) =>
      [harmless(title), ...lines.map(harmless), footer.replace(/[<>@]/g, `$&${zeroWidthSpace}`)]
        .join("\n")
        .trimEnd(),
    (text) => text.length <= budgetCharacters,
  );
  return JSON.stringify({ content, allowed_mentions: { parse: [] } });
}

function harmless(line: string): string {
  return breakLinks(line)
    .replace(/[\\*_~`|>[\]()]/g, "\\$&")
    .replaceAll("<", `<${zeroWidthSpace}`)
    .replace(/^(\s*)([#-])/, "$1\\$2");
}
