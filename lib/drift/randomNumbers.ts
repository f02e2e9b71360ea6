import { polarNormal } from "../numeric/polarNormal.ts";

/** Seeded uniform numbers in (0, 1): a 32-bit counter mixed twice, the same on every machine. */
export function uniformNumbers(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x9e3779b9) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 16), 0x21f0aaad);
    mixed = Math.imul(mixed ^ (mixed >>> 15), 0x735a2d97);
    return (((mixed ^ (mixed >>> 15)) >>> 0) + 0.5) / 2 ** 32;
  };
}

/** Student numbers of unit variance for an even number of degrees of freedom above two: a χ² of ν is a sum of ν/2 exponentials. */
export function studentNumbers(uniform: () => number, degreesOfFreedom: number): () => number {
  const normal = polarNormal(uniform);
  const pairs = degreesOfFreedom / 2;
  const scale = Math.sqrt(degreesOfFreedom - 2);
  return () => {
    let product = 1;
    for (let pair = 0; pair < pairs; pair++) product *= uniform();
    return (normal() * scale) / Math.sqrt(-2 * Math.log(product));
  };
}
