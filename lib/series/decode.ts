/** How text is written as bytes. */
export type Encoding = "utf-8" | "utf-16le" | "utf-16be" | "windows-1252";

const startsWith = (bytes: Uint8Array, ...codes: number[]) => codes.every((code, at) => bytes[at] === code);

export const isGzip = (head: Uint8Array) => startsWith(head, 0x1f, 0x8b);

/** Parquet files begin (and end) with PAR1. */
export const isParquet = (head: Uint8Array) => startsWith(head, 0x50, 0x41, 0x52, 0x31);

/** Some other kind of file, recognised by its first bytes; `undefined` for what may be a table. */
export function foreignFile(head: Uint8Array): string | undefined {
  if (startsWith(head, 0x50, 0x4b, 3, 4)) return "a workbook or archive (zip)";
  if (startsWith(head, 0xd0, 0xcf, 0x11, 0xe0)) return "an old workbook";
  if (startsWith(head, 0x25, 0x50, 0x44, 0x46)) return "a PDF";
  if (startsWith(head, 0x89, 0x50, 0x4e, 0x47) || startsWith(head, 0xff, 0xd8, 0xff)) return "a picture";
  if (startsWith(head, 0x53, 0x51, 0x4c, 0x69, 0x74, 0x65)) return "a database";
  if (isGzip(head)) return "compressed twice";
  return undefined;
}

/**
 * The encoding of a text: by its byte order mark; by the zero bytes that UTF-16 has in every other place; else UTF-8
 * where the bytes are valid UTF-8 and Windows-1252 where they are not (WHATWG Encoding Standard names).
 */
export function findEncoding(head: Uint8Array): Encoding {
  if (startsWith(head, 0xff, 0xfe)) return "utf-16le";
  if (startsWith(head, 0xfe, 0xff)) return "utf-16be";
  if (startsWith(head, 0xef, 0xbb, 0xbf)) return "utf-8";
  const seen = Math.min(head.length, 4096) & ~1;
  let evenZeros = 0;
  let oddZeros = 0;
  for (let at = 0; at < seen; at += 2) {
    if (head[at] === 0) evenZeros++;
    if (head[at + 1] === 0) oddZeros++;
  }
  if (seen >= 4 && oddZeros > seen * 0.35 && evenZeros === 0) return "utf-16le";
  if (seen >= 4 && evenZeros > seen * 0.35 && oddZeros === 0) return "utf-16be";
  try {
    new TextDecoder("utf-8", { fatal: true }).decode(head, { stream: true });
    return "utf-8";
  } catch {
    return "windows-1252";
  }
}

/** Control characters that no table holds say that the bytes are not text. */
export function looksBinary(text: string): boolean {
  let strange = 0;
  const seen = Math.min(text.length, 20_000);
  for (let at = 0; at < seen; at++) {
    const code = text.charCodeAt(at);
    if (code === 0) return true;
    if (
      (code < 32 && code !== 9 && code !== 10 && code !== 13 && code !== 12 && code !== 26) ||
      code === 0xfffd
    )
      strange++;
  }
  return strange > seen * 0.01;
}
