// Bytes 0x80 to 0x9f (WHATWG Encoding Standard, index windows-1252); all others are their own code point. Spelled out
// because TextDecoder of some Node releases reads this encoding as Latin-1.
const high =
  "\u20ac\u0081\u201a\u0192\u201e\u2026\u2020\u2021\u02c6\u2030\u0160\u2039\u0152\u008d\u017d\u008f" +
  "\u0090\u2018\u2019\u201c\u201d\u2022\u2013\u2014\u02dc\u2122\u0161\u203a\u0153\u009d\u017e\u0178";

/** Text from bytes in Windows-1252. */
export function windows1252(bytes: Uint8Array): string {
  const text = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength).toString("latin1");
  return text.replace(/[\x80-\x9f]/g, (character) => high[character.charCodeAt(0) - 0x80]);
}
