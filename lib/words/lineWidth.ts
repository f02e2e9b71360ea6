/** No line of the business note is longer, so that a phone shows it in a few rows. */
const longestLine = 160;

export const fits = (line: string) => [...line].length <= longestLine;

/** "Quay: about 185 loans …": the name, then what is said of it, ending in a full stop. */
export function sentence(label: string, text: string): string {
  const whole = `${label}: ${text}`;
  return /[.!?…]$/.test(whole) ? whole : `${whole}.`;
}

/**
 * Breaks a line into lines that fit, at spaces where it can; a word longer than half a line is cut. Lines after the
 * first begin with `again`, so that each says what it is about.
 */
export function wrapLine(line: string, again = ""): string[] {
  const lines: string[] = [];
  let rest = [...line];
  while (rest.length > longestLine) {
    const space = rest.lastIndexOf(" ", longestLine);
    const at = space > longestLine / 2 ? space : longestLine;
    lines.push(rest.slice(0, at).join("").trimEnd());
    rest = [...again, ...rest.slice(at).join("").trimStart()];
  }
  return [...lines, rest.join("")];
}
