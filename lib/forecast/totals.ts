import type { AverageForecast } from "./averageForecast.ts";
import { meanError, shockResponse } from "./memberFit.ts";
import { mixtureDeviation } from "./mixtureDeviation.ts";
import { spreadQuantile } from "./predictiveSpread.ts";

/**
 * Quantile function of the sum over the horizon. Errors of coming periods share shocks: with ψ the shock response of
 * a candidate on its scale and d_h the slope back to units of the series, the sum varies by
 * σ² Σ_j (Σ_{h≥j} d_h ψ_{h−j})², and by what not knowing the mean adds to all steps together. Candidates of a scale are mixed as at each step (`mixtureDeviation`); scales are
 * averaged by quantile, the logarithmic one as a lognormal of the same relative deviation.
 *
 * The sum runs over steps `from`..end (earlier steps are past and unobserved). The result increases in `z`, which the
 * caller widens by the calibration, and is the sum of medians at zero.
 */
export function totalQuantile(average: AverageForecast, from: number): (z: number) => number {
  const { medians, scales } = average.spread;
  if (from === medians.length - 1) return (z) => spreadQuantile(average.spread, from, z);
  const sum = medians.subarray(from).reduce((all, median) => all + median, 0);
  const parts = scales
    .map(({ share, scale }, index) => {
      const deviation = totalDeviation(average, index, from);
      // On the logarithm the sum is lognormal with the same relative deviation; on other scales it is normal.
      const relative = scale.name === "log" && sum > 0;
      return (z: number): number =>
        share * (relative ? scale.apart(Math.log(sum), (z * deviation) / sum) : sum + z * deviation);
    })
    .filter((_, index) => scales[index].share > 0);
  return (z) => parts.reduce((value, part) => value + part(z), 0);
}

/** Standard deviation of the sum as one working scale sees it, in units of the series. */
function totalDeviation(average: AverageForecast, index: number, from: number): number {
  const { medians } = average.spread;
  const { scale } = average.scales[index];
  const horizon = medians.length;
  const sum = medians.subarray(from).reduce((all, median) => all + median, 0);
  const { deviations } = average.spread.scales[index];
  const slopes = medians.map((median, h) => {
    const anchored = scale.forward(median);
    if (!Number.isFinite(anchored)) return 1;
    // Where the scale bends within a deviation (a root near zero) the slope is that across it.
    const reach = deviations[h];
    if (scale.name !== "square-root" || !(reach > anchored)) return scale.slope(anchored);
    return (scale.apart(anchored, reach) - scale.apart(anchored, -reach)) / (2 * reach);
  });
  const precisions: number[] = [];
  const distances: number[] = [];
  const weights: number[] = [];
  average.candidates.forEach((candidate, i) => {
    const fit = average.fits[i];
    if (candidate.scale !== index || fit === undefined || average.weights[i] === 0) return;
    const response = shockResponse(fit, horizon);
    let variance = 0;
    for (let j = 0; j < horizon; j++) {
      let effect = 0;
      for (let h = Math.max(j, from); h < horizon; h++) effect += slopes[h] * response[h - j];
      variance += fit.model.innovationVariance * effect * effect;
    }
    const mean = meanError(fit, candidate.drift, horizon);
    let meanEffect = 0;
    for (let h = from; h < horizon; h++) meanEffect += slopes[h] * mean.effect[h];
    variance += mean.variance * meanEffect * meanEffect;
    let ownSum = 0;
    for (let h = from; h < horizon; h++) ownSum += average.paths[i * horizon + h];
    precisions.push(1 / variance);
    distances.push(Math.abs(ownSum - sum));
    weights.push(average.weights[i]);
  });
  if (weights.length === 0) return 0;
  return mixtureDeviation(
    Float64Array.from(precisions),
    Float64Array.from(distances),
    Float64Array.from(weights),
    new Int32Array(weights.length),
  );
}
