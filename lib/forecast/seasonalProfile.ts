/**
 * Seasonal profile of a level series by classical decomposition, shrunk by evidence.
 *
 * The trend is a centred moving average of one season (half weights at both ends when the length is even); what is
 * left is averaged by season and centred. The profile is multiplied by max(0, 1 − 1/F), where F is the ratio of the
 * variance between seasons to that within (James and Stein's positive-part rule, 1961): a profile that noise alone
 * would give vanishes, a strong one stays whole.
 *
 * `values` without gaps, at least 2·length of them, index 0 being season 0. Returns `length` numbers summing to zero.
 */
export function levelProfile(values: Float64Array, length: number, count: number): Float64Array {
  const half = length >> 1;
  const profile = new Float64Array(length);
  const counts = new Float64Array(length);
  const detrended = new Float64Array(count);
  const endWeight = length % 2 === 0 ? 0.5 : 1;
  let window = 0;
  for (let t = 0; t < 2 * half + 1; t++) window += values[t];
  for (let t = half; t + half < count; t++) {
    const trend = (window - (1 - endWeight) * (values[t - half] + values[t + half])) / length;
    detrended[t] = values[t] - trend;
    profile[t % length] += detrended[t];
    counts[t % length]++;
    if (t + half + 1 < count) window += values[t + half + 1] - values[t - half];
  }
  return shrink(profile, counts, detrended, half, count - half, 0);
}

/** The same for a series that has no level to remove (differences): plain season means about the overall mean. */
export function meanProfile(
  values: Float64Array,
  length: number,
  count: number,
  offset: number,
): Float64Array {
  const profile = new Float64Array(length);
  const counts = new Float64Array(length);
  for (let t = 0; t < count; t++) {
    profile[(t + offset) % length] += values[t];
    counts[(t + offset) % length]++;
  }
  return shrink(profile, counts, values, 0, count, offset);
}

/** Turns season sums into centred means and shrinks them; `data[from..to)` are the values the sums were made of. */
function shrink(
  sums: Float64Array,
  counts: Float64Array,
  data: Float64Array,
  from: number,
  to: number,
  offset: number,
): Float64Array {
  const length = sums.length;
  let centre = 0;
  for (let s = 0; s < length; s++) {
    sums[s] = counts[s] > 0 ? sums[s] / counts[s] : 0;
    centre += sums[s] / length;
  }
  let between = 0;
  for (let s = 0; s < length; s++) between += counts[s] * (sums[s] - centre) ** 2;
  let within = 0;
  for (let t = from; t < to; t++) within += (data[t] - sums[(t + offset) % length]) ** 2;
  const freedom = to - from - length;
  const kept = freedom > 0 && between > 0 ? Math.max(0, 1 - within / freedom / (between / (length - 1))) : 0;
  for (let s = 0; s < length; s++) sums[s] = kept * (sums[s] - centre);
  return sums;
}
