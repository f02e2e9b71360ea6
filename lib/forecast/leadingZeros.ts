/** A run of zeros less likely than this among the values that came later belongs to another time. */
const UNLIKELY = 0.01;

/**
 * How many zeros at the start of a series come from before there was anything to count: a branch not yet open, an
 * article not yet on the shelf. 0 unless they are more than the zeros among the later values make likely, by the
 * chance that so many come in a row when z of the m values after the first other one are zero,
 * Π (z + 1 + i)/(m + 2 + i), each by the rule of succession (Laplace 1774). Fewer than `least` values after them say
 * too little. Gaps are passed over; the count includes those among the zeros.
 */
export function leadingZeros(values: Float64Array, least: number): number {
  let started = 0;
  let run = 0;
  while (started < values.length && !(Math.abs(values[started]) > 0)) {
    if (values[started] === 0) run++;
    started++;
  }
  let later = 0;
  let zeros = 0;
  for (let t = started + 1; t < values.length; t++) {
    if (Number.isNaN(values[t])) continue;
    later++;
    if (values[t] === 0) zeros++;
  }
  if (run === 0 || later + 1 < least) return 0;
  let chance = 1;
  for (let i = 0; i < run; i++) chance *= (zeros + 1 + i) / (later + 2 + i);
  return chance < UNLIKELY ? started : 0;
}
