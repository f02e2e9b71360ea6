import type { Message } from "./message.ts";
import { plainLine } from "./plainText.ts";

/** The readable part of a message, cleaned and ready to be set in one syntax or another. */
export interface Readable {
  readonly title: string;
  readonly lines: readonly string[];
  readonly footer: string;
}

/** Longest title, line and footer, so that no single name can use up a whole message. */
const longest = { title: 150, line: 500, footer: 400 };

/**
 * Renders a message so that it passes `fits`: with all its lines, or else with as many as possible from the first
 * on, the last then saying how many more there were. Lines are kept or dropped whole.
 */
export function fitLines<Body>(
  message: Message,
  render: (readable: Readable) => Body,
  fits: (body: Body) => boolean,
): Body {
  const title = plainLine(message.title, longest.title);
  const footer = plainLine(message.footer, longest.footer);
  const lines = message.lines.map((line) => plainLine(line, longest.line));
  const withLines = (count: number) => {
    const dropped = lines.slice(count).filter((line) => line !== "").length;
    const shown = lines.slice(0, count);
    return render({ title, lines: dropped === 0 ? shown : [...shown, `… and ${dropped} more`], footer });
  };
  const whole = withLines(lines.length);
  if (fits(whole)) return whole;
  let enough = 0;
  let tooMany = lines.length;
  while (tooMany - enough > 1) {
    const middle = (enough + tooMany) >> 1;
    if (fits(withLines(middle))) enough = middle;
    else tooMany = middle;
  }
  return withLines(enough);
}
