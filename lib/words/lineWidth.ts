/** No line of the business note is longer, so that a phone shows it in three lines or fewer. */
const longestLine = 160;

/** "Quay: about 157 loans …": the name, then what is said of it, ending in a full stop. */
export function sentence(label: string, text: string): string {
  const whole = `${label}: ${text}`;
  return /[.!?…▁▂▃▄▅▆▇█·]$/u.test(whole) ? whole : `${whole}.`;
}

/**
 * Breaks a line into lines no longer than a phone shows well, at the last space or after the last mark that fits.
 * A word longer than a line is cut.
 */
export function wrapLine(line: string, longest = longestLine): string[] {
  const lines: string[] = [];
  let rest = [...line];
  while (rest.length > longest) {
    const space = rest.lastIndexOf(" ", longest);
    const at = space > longest / 2 ? space : longest;
    lines.push(rest.slice(0, at).join("").trimEnd());
    rest = [...rest.slice(at).join("").trimStart()];
  }
  return [...lines, rest.join("")];
}
