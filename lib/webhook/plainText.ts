/**
 * Characters that steer text rather than show: C0 and C1 controls, bidirectional marks, embeddings, overrides and
 * isolates (Unicode UAX 9), invisible operators, interlinear marks and tag characters, and the byte order mark.
 * Zero-width joiners stay: emoji and several scripts need them.
 */
export const steering =
  // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is looked for
  /[\u0000-\u001f\u007f-\u009f\u061c\u200e\u200f\u202a-\u202e\u2060-\u206f\ufeff\ufff9-\ufffb\u{e0000}-\u{e007f}]/gu;

const lineBreaks = /[\t\n\v\f\r\u0085\u2028\u2029]+/g;
const loneSurrogates = /[\ud800-\udfff]/gu;

/** A space of no width: breaks a mention or an address without being seen. */
export const zeroWidthSpace = "\u200b";

/**
 * One line of visible text: line breaks become spaces, steering characters go, lone surrogates become U+FFFD,
 * and what is longer than `longest` UTF-16 units ends in "…".
 *
 * @example plainLine("total\u202etxt.exe\n", 80) // "totaltxt.exe"
 */
export function plainLine(text: string, longest: number): string {
  const plain = text
    .replace(lineBreaks, " ")
    .replace(steering, "")
    .replace(loneSurrogates, "\ufffd")
    .trimEnd();
  if (plain.length <= longest) return plain;
  const cut = plain.slice(0, longest - 1).replace(/[\ud800-\udbff]$/, "");
  return `${cut.trimEnd()}…`;
}

/**
 * Breaks what a chat program would turn into a mention or a link, by spaces of no width: after every `@`, in `://`,
 * `www.` and `mailto:`, and in what looks like a host name (but not in the names of our own files).
 *
 * @example breakLinks("ping @all at evil.example") // "ping @\u200ball at evil.\u200bexample"
 */
export function breakLinks(text: string): string {
  return text
    .replaceAll("@", `@${zeroWidthSpace}`)
    .replaceAll("://", `:${zeroWidthSpace}//`)
    .replace(/\b(www|mailto|tel|javascript|data)(?=[.:])/gi, `$1${zeroWidthSpace}`)
    .replace(/(?<=[\p{L}\p{N}])\.(?=\p{L}{2})(?!(?:csv|json|html|svg|txt)\b)/gu, `.${zeroWidthSpace}`);
}
