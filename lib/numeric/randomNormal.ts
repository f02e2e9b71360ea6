import { polarNormal } from "./polarNormal.ts";

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
  return polarNormal(uniform);
}
