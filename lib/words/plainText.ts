// Control, format (bidirectional, zero-width), private-use and unassigned characters, lone surrogates and
// line separators: none of them may come from a file name or a header into a message, a terminal or a page.
const unseen = /[\p{Cc}\p{Cf}\p{Co}\p{Cn}\p{Cs}\p{Zl}\p{Zp}]/gu;
// More than two combining marks on one letter let a name spill over neighbouring lines.
const stackedMarks = /(\p{M}{2})\p{M}+/gu;

/**
 * A text from outside as harmless single-line text of at most `longest` characters, cut at its end.
 * Never empty: a text without a visible character becomes "(no name)".
 *
 * @example plainText("Quay\u202E\n", 40) // "Quay"
 */
export function plainText(text: string, longest: number): string {
  const letters = visible(text);
  return letters.length <= longest
    ? letters.join("")
    : `${letters
        .slice(0, longest - 1)
        .join("")
        .trimEnd()}…`;
}

/** The same for a name, cut in its middle: long names often differ at their ends alone. */
export function plainName(name: string, longest = 48): string {
  const letters = visible(name);
  if (letters.length <= longest) return letters.join("");
  const end = Math.floor((longest - 1) / 3);
  return `${letters
    .slice(0, longest - 1 - end)
    .join("")
    .trimEnd()}…${letters.slice(-end).join("").trimStart()}`;
}

function visible(text: string): string[] {
  const shown = text
    .replace(/[\s\p{Zs}]+/gu, " ")
    .replace(unseen, "")
    .replace(stackedMarks, "$1")
    .trim();
  return [...(shown === "" ? "(no name)" : shown)];
}
