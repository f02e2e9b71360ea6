/**
 * Turns a standard normal quantile into that of Student's t at the same probability, by the Cornish–Fisher series of
 * Abramowitz and Stegun 26.7.5 (three digits from 4 degrees of freedom on, more with more): the tails of an error
 * whose size is itself estimated. Increasing in `z`.
 */
export function studentFromNormal(z: number, freedom: number): number {
  const z2 = z * z;
  const first = (z * (z2 + 1)) / 4;
  const second = (z * (5 * z2 * z2 + 16 * z2 + 3)) / 96;
  const third = (z * (3 * z2 ** 3 + 19 * z2 * z2 + 17 * z2 - 15)) / 384;
  return z + first / freedom + second / freedom ** 2 + third / freedom ** 3;
}
