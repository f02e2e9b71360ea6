import { polarNormal } from "../numeric/polarNormal.ts";

/**
 * A stream of standard normal numbers from a seed, the same on every machine: the counter generator of SplitMix
 * (Steele, Lea and Flood 2014) in 32 bits, through the polar method of Marsaglia and Bray (1964).
 */
export function normalDraws(seed: number): () => number {
  let state = seed >>> 0;
  const uniform = (): number => {
    state = (state + 0x9e3779b9) >>> 0;
    let mixed = state;
    mixed = Math.imul(mixed ^ (mixed >>> 16), 0x21f0aaad);
    mixed = Math.imul(mixed ^ (mixed >>> 15), 0x735a2d97);
    return ((mixed ^ (mixed >>> 15)) >>> 0) / 4294967296;
  };
  return polarNormal(uniform);
}
