import { tabulate } from "../numeric/tabulate.ts";

/** Number of seasonal columns: a pattern of up to 12 periods in full, of a longer one the first three waves. */
function waveColumns(season: number): number {
  if (season < 2) return 0;
  return season <= 12 ? season - 1 : 6;
}

/**
 * Regression columns of the describing model over `count` periods from period `from`: a constant, a straight line
 * counted in units of `span` periods if there is a trend, and the season as cosines and sines. None at all when the
 * model has neither, for then the process mean does the work.
 */
export function describingColumns(
  trend: boolean,
  season: number,
  from: number,
  count: number,
  span: number,
): Float64Array[] {
  const waves = waveColumns(season);
  if (!trend && waves === 0) return [];
  const columns = [new Float64Array(count).fill(1)];
  if (trend) columns.push(tabulate(count, (t) => (from + t) / span));
  for (let column = 0; column < waves; column++) {
    const wave = (column >> 1) + 1;
    const turn = (2 * Math.PI * wave) / season;
    const wavelike = column % 2 === 0 ? Math.cos : Math.sin;
    const pattern = tabulate(season, (place) => wavelike(turn * place));
    const values = new Float64Array(count);
    for (let t = 0; t < count; t++) values[t] = pattern[(((from + t) % season) + season) % season];
    columns.push(values);
  }
  return columns;
}
