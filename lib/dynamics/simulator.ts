import { coefficientsToPartials, stepUp } from "../autoregression/partials.ts";

/**
 * A function that overwrites a series with a draw from a stationary Gaussian AR process with unit innovations, made of as
 * many independent standard normal `shocks`. The first p values are drawn from their exact joint distribution, each from
 * its predictor on the ones before it, so there is no warm-up. Throws `RangeError` for a process that is not stationary.
 */
export function simulator(coefficients: Float64Array): (series: Float64Array, shocks: Float64Array) => void {
  const p = coefficients.length;
  const partials = coefficientsToPartials(coefficients);
  // Row t holds the predictor of value t from the t ones before it.
  const predictors: Float64Array[] = [];
  const deviations = new Float64Array(p);
  const predictor = new Float64Array(p);
  let variance = 1;
  for (const partial of partials) variance /= (1 - partial) * (1 + partial);
  for (let t = 0; t < p; t++) {
    predictors.push(predictor.slice(0, t));
    deviations[t] = Math.sqrt(variance);
    stepUp(predictor, t + 1, partials[t]);
    variance *= (1 - partials[t]) * (1 + partials[t]);
  }
  return (series, shocks) => {
    const start = Math.min(p, series.length);
    for (let t = 0; t < start; t++) {
      let value = deviations[t] * shocks[t];
      for (let j = 0; j < t; j++) value += predictors[t][j] * series[t - 1 - j];
      series[t] = value;
    }
    for (let t = start; t < series.length; t++) {
      let value = shocks[t];
      for (let j = 0; j < p; j++) value += coefficients[j] * series[t - 1 - j];
      series[t] = value;
    }
  };
}
