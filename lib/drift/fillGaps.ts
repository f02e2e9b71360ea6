/** Puts straight lines across gaps (`NaN`), the nearest value beyond either end. At least one value must be there. */
export function bridgeGaps(values: Float64Array): void {
  let last = -1;
  for (let at = 0; at < values.length; at++) {
    if (Number.isNaN(values[at])) continue;
    for (let gap = last + 1; gap < at; gap++) {
      const left = last < 0 ? values[at] : values[last];
      values[gap] = left + ((values[at] - left) * (gap - last)) / (at - last);
    }
    last = at;
  }
  if (last < 0) throw new RangeError("bridgeGaps needs at least one value that is not a gap");
  values.fill(values[last], last + 1);
}

/**
 * Moves the values at `gaps` to where the model puts them: the least-squares interpolation that makes the
 * residuals around them smallest (Brubacher and Tunnicliffe Wilson 1976), by up to 30 sweeps of the exact
 * one-gap solution ω = Σ π_j e_{s+j} / Σ π_j². `residuals` are kept in step.
 *
 * @param weights π_0..π_p = 1, −φ_1, …
 */
export function interpolateGaps(
  values: Float64Array,
  residuals: Float64Array,
  gaps: readonly number[],
  weights: Float64Array,
  count: number,
): void {
  const order = weights.length - 1;
  for (let sweep = 0; sweep < 30; sweep++) {
    let largest = 0;
    for (const gap of gaps) {
      let sum = 0;
      let squares = 0;
      for (let j = gap < order ? order - gap : 0; j <= order && gap + j < count; j++) {
        sum += weights[j] * residuals[gap + j];
        squares += weights[j] * weights[j];
      }
      if (squares === 0) continue;
      const move = sum / squares;
      values[gap] -= move;
      for (let j = gap < order ? order - gap : 0; j <= order && gap + j < count; j++)
        residuals[gap + j] -= move * weights[j];
      largest = Math.max(largest, Math.abs(move));
    }
    if (largest < 1e-9) break;
  }
}
