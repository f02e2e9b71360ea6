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

/**
 * Sets sentences into lines that fit, as many to a line as there is room for and none over two lines; only one longer
 * than a line is broken, and goes on after dots.
 */
export function sentenceLines(text: string): string[] {
  const lines: string[] = [];
  for (const one of text.split(/(?<=[.!?…]["')”]?) +(?=["'(“]?\p{L})/u)) {
    const joined = lines.length > 0 ? `${lines[lines.length - 1]} ${one}` : one;
    if (lines.length > 0 && fits(joined)) lines[lines.length - 1] = joined;
    else lines.push(...wrapLine(one, "… "));
  }
  return lines;
}
