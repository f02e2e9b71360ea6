/** Repeats the last observed value, or with a season length above 1 the last observed value of the same season. */
export function naiveForecast(
  values: ArrayLike<number>,
  count: number,
  season: number,
  horizon: number,
): Float64Array {
  const out = new Float64Array(horizon);
  let last = count - 1;
  while (last > 0 && Number.isNaN(values[last])) last--;
  for (let h = 0; h < horizon; h++) {
    let at = season > 1 ? count - season + (h % season) : last;
    while (at >= 0 && Number.isNaN(values[at])) at -= Math.max(1, season);
    out[h] = at >= 0 ? values[at] : values[last];
  }
  return out;
}
