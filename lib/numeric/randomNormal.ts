/**
 * Standard normal variates from a seed: uniform numbers of Marsaglia's (2003) xorshift32 with a Weyl sequence
 * (period about 2⁶⁴), turned normal by the polar method (Marsaglia & Bray 1964). The same seed gives the same numbers
 * on every machine.
 */
export function randomNormal(seed: number): () => number {
  let state = (Math.imul(seed | 0, 0x9e3779b1) ^ 0x5bd1e995) | 0 || 1;
  let weyl = 0;
  const uniform = () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    weyl = (weyl + 362437) | 0;
    return (((state + weyl) >>> 0) + 0.5) / 4294967296;
  };
  for (let i = 0; i < 16; i++) uniform();
  let spare = Number.NaN;
  return () => {
    if (!Number.isNaN(spare)) {
      const value = spare;
      spare = Number.NaN;
      return value;
    }
    for (;;) {
      const x = 2 * uniform() - 1;
      const y = 2 * uniform() - 1;
      const size = x * x + y * y;
      if (size >= 1 || size === 0) continue;
      const scale = Math.sqrt((-2 * Math.log(size)) / size);
      spare = y * scale;
      return x * scale;
    }
  };
}
