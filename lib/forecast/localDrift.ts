/** Half-lives tried, as shares of the series; the last stands for the whole of it. */
const SHARES = [0.1, 0.2, 0.4, 0.8, Number.POSITIVE_INFINITY];
/** Two values of weight are the least that can be called a mean. */
const SHORTEST = 2;

/**
 * Mean of a recent stretch whose length the series itself chooses: exponentially weighted means with half-lives from
 * a tenth of the series to all of it are each run through the past, and the one whose mean so far was nearest to the
 * next value (least squared error from the first quarter on) gives its last mean.
 */
export function localDrift(steps: Float64Array): number {
  const count = steps.length;
  const from = Math.ceil(count / 4);
  let least = Number.POSITIVE_INFINITY;
  let chosen = 0;
  for (const share of SHARES) {
    const decay = 0.5 ** (1 / Math.max(SHORTEST, share * count));
    let weight = 1;
    let sum = steps[0];
    let errors = 0;
    for (let t = 1; t < count; t++) {
      if (t >= from) errors += (steps[t] - sum / weight) ** 2;
      sum = sum * decay + steps[t];
      weight = weight * decay + 1;
    }
    if (errors < least) {
      least = errors;
      chosen = sum / weight;
    }
  }
  return chosen;
}
