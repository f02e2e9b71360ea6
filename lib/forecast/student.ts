/**
 * Turns a standard normal quantile into that of Student's t at the same probability, by the Cornish–Fisher series of
 * Abramowitz and Stegun 26.7.5: the tails of an error whose size is itself estimated. Of published tables, it falls
 * short with 4 degrees of freedom by 0.3 % at the 95 % range (2.769 for 2.776), 1.3 % at 99 % and 5 % at 99.9 %; from
 * 8 on it is within 0.5 % there too. Increasing in `z`.
 */
export function studentFromNormal(z: number, freedom: number): number {
  const z2 = z * z;
  const first = (z * (z2 + 1)) / 4;
  const second = (z * (5 * z2 * z2 + 16 * z2 + 3)) / 96;
  const third = (z * (3 * z2 ** 3 + 19 * z2 * z2 + 17 * z2 - 15)) / 384;
  return z + first / freedom + second / freedom ** 2 + third / freedom ** 3;
}
