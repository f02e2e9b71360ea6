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

/** The inverse of `studentFromNormal`, by halving. */
export function normalFromStudent(t: number, freedom: number): number {
  let low = 0;
  let high = Math.min(Math.abs(t), 40);
  // The series is increasing and lies above its argument, so the root is between zero and t.
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2;
    if (studentFromNormal(middle, freedom) < Math.abs(t)) low = middle;
    else high = middle;
  }
  return t < 0 ? -high : high;
}
