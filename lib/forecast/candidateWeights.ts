/**
 * Weights of candidates from their rolling-origin losses: inverse to a power of the mean squared error, each error
 * divided by the square root of its step ahead so that far steps, whose errors grow like a random walk's, do not
 * drown the near ones. Power 1 is the rule of Bates and Granger (1969); see `weightPower` for the one in use.
 *
 * `losses` row o (stride `count`) holds each candidate's loss at origin o, `NaN` when it could not be fitted there.
 * `usable` marks candidates with a forecast to weigh. Without losses: equal weights.
 */
export function candidateWeights(
  losses: readonly Float64Array[],
  usable: (candidate: number) => boolean,
  count: number,
  power: number,
): Float64Array {
  const means = new Float64Array(count);
  let best = Number.POSITIVE_INFINITY;
  let average = 0;
  let known = 0;
  for (let i = 0; i < count; i++) {
    let sum = 0;
    let seen = 0;
    for (let o = 0; o < losses.length; o++) {
      if (Number.isNaN(losses[o][i])) continue;
      sum += losses[o][i];
      seen++;
    }
    means[i] = seen > 0 ? sum / seen : Number.NaN;
    if (!usable(i)) means[i] = Number.NaN;
    if (Number.isNaN(means[i])) continue;
    known++;
    average += means[i];
    if (means[i] < best) best = means[i];
  }
  const weights = new Float64Array(count);
  // The floor keeps a candidate that was exact by luck from taking everything.
  const floor = known > 0 ? (1e-9 * average) / known : 0;
  for (let i = 0; i < count; i++) {
    if (known === 0 || average === 0) weights[i] = usable(i) ? 1 : 0;
    else if (!Number.isNaN(means[i])) weights[i] = ((best + floor) / (means[i] + floor)) ** power;
  }
  return weights;
}

/**
 * Power for the evidence of so many independent horizons: half their number. With a Gaussian error of unknown size,
 * E independent errors have likelihood proportional to MSE^(−E/2), so that these are the posterior odds of equally
 * likely candidates; without evidence all weigh alike.
 */
export function weightPower(horizons: number): number {
  return horizons / 2;
}
