/** Lowest tabulated u = ln|e/σ|; steps of 0.1 are cut into 32 finer ones. */
const lowest = -8;
const step = 0.1;
const cuts = 32;
const coarseSteps = 160;

const tables = new Map<number, Float64Array>();

/**
 * −½(ν+1)·ln(1 + e^{2u}/ν) for u from −8 to 8, made once for each ν. The σ grid of the shock-size likelihood has
 * a step of 0.1, so one logarithm finds a residual's place for all its grid points, `cuts` entries apart.
 */
export function studentTable(degreesOfFreedom: number): Float64Array {
  const known = tables.get(degreesOfFreedom);
  if (known !== undefined) return known;
  const table = Float64Array.from({ length: coarseSteps * cuts + 1 }, (_, i) => {
    const ratio = Math.exp(2 * (lowest + (step / cuts) * i)) / degreesOfFreedom;
    return -0.5 * (degreesOfFreedom + 1) * Math.log1p(ratio);
  });
  tables.set(degreesOfFreedom, table);
  return table;
}

/**
 * Adds to `into[offset + i]`, i = 0..count−1, the log density of `residual` at ln σ = `logScale` + 0.1·i, all but
 * the term −ln σ, by linear interpolation in the table (error below 1e-4 within five σ).
 */
export function addStudentRow(
  table: Float64Array,
  residual: number,
  logScale: number,
  into: Float64Array,
  offset: number,
  count: number,
): void {
  const position = ((Math.log(Math.abs(residual) + 1e-300) - logScale - lowest) * cuts) / step;
  // Below the table the density no longer depends on the residual; above it (e³ standard deviations) it stays.
  const bounded = Math.min(Math.max(position, (count - 1) * cuts), coarseSteps * cuts - 1e-6);
  const whole = Math.floor(bounded);
  const part = bounded - whole;
  for (let i = 0, at = whole; i < count; i++, at -= cuts)
    into[offset + i] += table[at] + part * (table[at + 1] - table[at]);
}
