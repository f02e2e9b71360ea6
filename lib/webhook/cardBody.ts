import { fitLines, type Readable } from "./fitLines.ts";
import type { Message } from "./message.ts";
import { breakLinks } from "./plainText.ts";

const budgetBytes = 18_000;

/**
 * An Adaptive Card in the envelope that chat programs take. Text stands in `TextRun`s, which are shown as they
 * are, where a `TextBlock` would read Markdown.
 */
export function cardBody(message: Message): string {
  return fitLines(
    message,
    (readable) => JSON.stringify(envelope(readable)),
    (body) => Buffer.byteLength(body) <= budgetBytes,
  );
}

function envelope({ title, lines, footer }: Readable) {
  return {
    type: "message",
    attachments: [
      {
        contentType: "application/vnd.microsoft.card.adaptive",
        contentUrl: null,
        content: {
          $schema: "http://adaptivecards.io/schemas/adaptive-card.json",
          type: "AdaptiveCard",
          version: "1.2",
          fallbackText: breakLinks(title),
          body: [
            paragraph(breakLinks(title), { weight: "Bolder", size: "Medium" }),
            ...lines.filter((line) => line !== "").map((line) => paragraph(breakLinks(line), {})),
            ...(footer === "" ? [] : [paragraph(footer, { isSubtle: true, size: "Small" }, footer)]),
          ],
        },
      },
    ],
  };
}

/** A paragraph; an address in `linked` (our own footer) opens when the paragraph is selected. */
function paragraph(text: string, look: Readonly<Record<string, unknown>>, linked = "") {
  const url = /https:\/\/[^\s<>"]+/.exec(linked)?.[0];
  const action = url === undefined ? {} : { selectAction: { type: "Action.OpenUrl", url } };
  return { type: "RichTextBlock", inlines: [{ type: "TextRun", text, ...look, ...action }] };
}
