/** A 32-bit seed from text (FNV-1a, Fowler, Noll and Vo): the same run draws the same numbers everywhere. */
export function seedOf(...parts: readonly string[]): number {
  let hash = 0x811c9dc5;
  for (const byte of new TextEncoder().encode(parts.join("\u0000")))
    hash = Math.imul(hash ^ byte, 0x01000193) >>> 0;
  return hash;
}
