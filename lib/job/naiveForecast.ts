/**
 * Repeats the last season, or the last value where there is none: what a track record is held against. A gap is
 * passed over, to the same place one season earlier.
 */
export function naiveForecast(values: Float64Array, season: number, horizon: number): number[] {
  const step = season > 1 && values.length >= season ? season : 1;
  return Array.from({ length: horizon }, (_, ahead) => {
    let index = values.length - step + (ahead % step);
    while (index >= 0 && Number.isNaN(values[index])) index -= step;
    if (index >= 0) return values[index];
    return values.findLast((value) => !Number.isNaN(value)) ?? 0;
  });
}
