// Control, format (bidirectional, zero-width), private-use and unassigned characters, lone surrogates and
// line separators: none of them may come from a file name or a header into a message, a terminal or a page.
const unseen = /[\p{Cc}\p{Cf}\p{Co}\p{Cn}\p{Cs}\p{Zl}\p{Zp}]/gu;
// More than two combining marks on one letter let a name spill over neighbouring lines.
const stackedMarks = /(\p{M}{2})\p{M}+/gu;

/**
 * A name or message from outside as harmless single-line text of at most `longest` characters.
 * Never empty: a name without a visible character becomes "(no name)".
 *
 * @example plainText("Quay\u202E\n", 40) // "Quay"
 */
export function plainText(text: string, longest = 48): string {
  const visible = text
    .replace(/[\s\p{Zs}]+/gu, " ")
    .replace(unseen, "")
    .replace(stackedMarks, "$1")
    .trim();
  if (visible === "") return "(no name)";
  const letters = [...visible];
  return letters.length <= longest
    ? visible
    : `${letters
        .slice(0, longest - 1)
        .join("")
        .trimEnd()}…`;
}
