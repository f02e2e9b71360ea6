const blocks = "▁▂▃▄▅▆▇█";

/**
 * Past values and forecast as one row of block characters on one scale, the two parts split by "|".
 * A gap is "·". A series that never moves is drawn half high.
 *
 * @example sparkline([1, 2, null, 4], [3]) // "▁▃·█|▆"
 */
export function sparkline(values: readonly (number | null)[], forecast: readonly number[]): string {
  const present = [...values, ...forecast].filter(
    (value): value is number => value !== null && Number.isFinite(value),
  );
  const low = Math.min(...present);
  const reach = Math.max(...present) - low;
  const draw = (value: number | null) => {
    if (value === null || !Number.isFinite(value)) return "·";
    return reach > 0 ? blocks[Math.min(7, Math.floor(((value - low) / reach) * 8))] : blocks[3];
  };
  return `${values.map(draw).join("")}|${forecast.map(draw).join("")}`;
}
