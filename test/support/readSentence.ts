/** Reads a number as en-GB writes it: "1,234.5", "-3", "1.2 billion". */
export function readNumber(text: string): number {
  const [digits, word] = text.split(" ");
  const scale = { thousand: 1e3, million: 1e6, billion: 1e9, trillion: 1e12 }[word ?? ""] ?? 1;
  const plain = digits.replaceAll(",", "");
  const value = Number(plain);
  if (Number.isNaN(value)) throw new Error(`not a number: ${text}`);
  return value * scale;
}

/** A number as it stands in a sentence, for use inside a larger pattern. */
export const number = String.raw`(-?[\d,]+(?:\.\d+)?(?:E-?\d+)?(?: (?:thousand|million|billion|trillion))?)`;
