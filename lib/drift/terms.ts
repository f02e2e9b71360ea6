/**
 * Columns of the reference besides the lags: a constant, a straight line if asked for, and the seasonal
 * pattern as sines and cosines. A pattern of up to 12 periods is carried in full (length − 1 columns); of a
 * longer one the first three waves, because a reference of a few seasons cannot hold more.
 */
export interface TermPlan {
  readonly trend: boolean;
  /** Length of the seasonal pattern in periods, 0 for none. */
  readonly season: number;
}

/** Number of seasonal columns. */
export function seasonColumns(season: number): number {
  if (season < 2) return 0;
  return season <= 12 ? season - 1 : 6;
}

/** Number of all columns: constant, line, season. */
export function termColumns({ trend, season }: TermPlan): number {
  return 1 + (trend ? 1 : 0) + seasonColumns(season);
}

/**
 * Writes the columns of time `time` into `out` from `offset` on. The line counts in units of `span` periods
 * from `origin`, so that all columns are of the size of one.
 */
export function writeTerms(
  out: Float64Array,
  offset: number,
  plan: TermPlan,
  time: number,
  origin: number,
  span: number,
): void {
  let place = offset;
  out[place++] = 1;
  if (plan.trend) out[place++] = (time - origin) / span;
  const columns = seasonColumns(plan.season);
  for (let column = 0; column < columns; column++) {
    const wave = (column >> 1) + 1;
    const angle = (2 * Math.PI * ((wave * time) % plan.season)) / plan.season;
    out[place++] = column % 2 === 0 ? Math.cos(angle) : Math.sin(angle);
  }
}
