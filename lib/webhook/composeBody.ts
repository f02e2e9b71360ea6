import { cardBody } from "./cardBody.ts";
import { contentBody } from "./contentBody.ts";
import { jsonBody } from "./jsonBody.ts";
import type { BodyShape, Message } from "./message.ts";
import { textBody } from "./textBody.ts";

/** What is posted. */
export interface ComposedBody {
  readonly body: string;
  readonly contentType: string;
}

const composers: Readonly<Record<BodyShape, (message: Message) => string>> = {
  text: textBody,
  content: contentBody,
  card: cardBody,
  json: jsonBody,
};

/**
 * Sets a message in one of the four body shapes, within the shape's budget: `text` 3,500 bytes, `content` 2,000
 * characters of text, `card` 18,000 bytes, `json` 20,000 bytes, after serialising. Lines that do not fit are left out
 * whole, and the last line says how many. Nothing in title or lines can become markup, a mention or a link; control
 * and bidirectional characters are taken out. The footer is the owner's and keeps its links.
 *
 * @throws {TypeError} when the shape is none of the four
 * @example composeBody({ title: "Loans", lines: ["Quay: 210 <b>"], footer: "", data: {} }, "text").body
 * // '{"text":"Loans\\nQuay: 210 &lt;b&gt;"}'
 */
export function composeBody(message: Message, shape: BodyShape): ComposedBody {
  const compose = composers[shape];
  if (compose === undefined)
    throw new TypeError(`composeBody needs text, content, card or json, not ${shape}`);
  return { body: compose(message), contentType: "application/json; charset=utf-8" };
}
