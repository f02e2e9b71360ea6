/** A run of zeros less likely than this among the values that came later belongs to another time. */
const UNLIKELY = 0.01;
/** One zero may be anything. */
const FEWEST = 2;
/** A run this many times as long as any later one is no season's: a shop shut by night or in winter. */
const LONGER = 2;
/** Fewest values after them that tell what zeros are like here. */
const LEAST_SINCE = 8;

/**
 * How many values at the start of a series come from before there was anything to count: a branch not yet open, an
 * article not yet on the shelf. 0 unless they are zeros, and more of them than the later values make likely: more than
 * twice the longest later run, and less than one in a hundred by the chance that so many come in a row when z of the
 * m values after the first other one are zero, Π (z + 1 + i)/(m + 2 + i), each by the rule of succession
 * (Laplace 1774). Gaps are passed over; the count includes those among the zeros.
 */
export function leadingZeros(values: Float64Array): number {
  let started = 0;
  let run = 0;
  while (started < values.length && !(Math.abs(values[started]) > 0)) {
    if (values[started] === 0) run++;
    started++;
  }
  let later = 0;
  let zeros = 0;
  let row = 0;
  let longest = 0;
  for (let t = started + 1; t < values.length; t++) {
    if (Number.isNaN(values[t])) continue;
    later++;
    row = values[t] === 0 ? row + 1 : 0;
    if (row > 0) zeros++;
    if (row > longest) longest = row;
  }
  if (run < FEWEST || run <= LONGER * longest || later + 1 < LEAST_SINCE) return 0;
  let chance = 1;
  for (let i = 0; i < run; i++) chance *= (zeros + 1 + i) / (later + 2 + i);
  return chance < UNLIKELY ? started : 0;
}
