// The rules hold for every store alike, so that a folder can be copied to a bucket and back.

/** Most bytes (UTF-8) an object key may have: the limit of S3, prefix included. */
const longestKey = 1024;
/** Most bytes one part of a key may have: the limit of the usual file systems. */
const longestPart = 255;

// biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is looked for
const forbidden = /[\u0000-\u001f\u007f\\]/;
const loneSurrogate = /[\ud800-\udfff]/u;

/**
 * Says what is wrong with an object key, or `undefined` when it is sound.
 *
 * Sound keys are relative, with `/` between parts; no part is empty, begins with a dot (which covers `.`,
 * `..` and the hidden files that systems leave about), or passes 255 bytes; the whole does not pass 1,024
 * bytes; there is no control character, backslash or lone surrogate.
 *
 * @example keyFault("models/loans/2026-11-30T06-00-00Z.json") // undefined
 * @example keyFault("../etc/passwd") // "a part begins with a dot"
 */
export function keyFault(key: string): string | undefined {
  if (key === "") return "the key is empty";
  if (forbidden.test(key)) return "the key holds a control character or a backslash";
  if (loneSurrogate.test(key)) return "the key is not well-formed Unicode";
  if (Buffer.byteLength(key) > longestKey) return `the key is longer than ${longestKey} bytes`;
  for (const part of key.split("/")) {
    if (part === "") return "a part of the key is empty";
    if (part.startsWith(".")) return "a part begins with a dot";
    if (Buffer.byteLength(part) > longestPart) return `a part is longer than ${longestPart} bytes`;
  }
  return undefined;
}

/** As `keyFault`, for the beginning of a key: the last part may be incomplete or empty. */
export function prefixFault(prefix: string): string | undefined {
  return prefix === "" ? undefined : keyFault(prefix.endsWith("/") ? `${prefix}x` : prefix);
}

/** Orders by UTF-16 code units, the order of `<` on strings, whatever the locale. */
export function byKey(left: { readonly key: string }, right: { readonly key: string }): number {
  return left.key < right.key ? -1 : left.key > right.key ? 1 : 0;
}
