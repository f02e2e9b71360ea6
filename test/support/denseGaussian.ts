/** log N(x; 0, Σ) of the entries that are not gaps, by an elimination of the whole covariance matrix. */
export function denseLogDensity(
  deviations: ArrayLike<number>,
  covariance: (i: number, j: number) => number,
): number {
  const places = Array.from(deviations).flatMap((value, i) => (Number.isNaN(value) ? [] : [i]));
  const n = places.length;
  const rows = places.map((i) => places.map((j) => covariance(i, j)));
  const rest = places.map((i) => deviations[i]);
  let sum = n * Math.log(2 * Math.PI);
  for (let k = 0; k < n; k++) {
    sum += Math.log(rows[k][k]) + rest[k] ** 2 / rows[k][k];
    for (let i = k + 1; i < n; i++) {
      const factor = rows[i][k] / rows[k][k];
      rest[i] -= factor * rest[k];
      for (let j = k; j < n; j++) rows[i][j] -= factor * rows[k][j];
    }
  }
  return -sum / 2;
}
