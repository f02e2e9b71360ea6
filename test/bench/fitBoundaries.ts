import { quantileRegression } from "./quantileRegression.ts";
import type { StablePath } from "./stablePaths.ts";

/** Regression of each kind's boundary, all kinds exceeded equally often and together at the false-alarm rate. */
export interface FittedBoundaries {
  readonly coefficients: readonly Float64Array[];
  /** How often each kind alone passes its boundary. */
  readonly share: number;
}

/**
 * Boundaries for `looks` looks at the false-alarm rate `rate` from stable paths: quantile regressions of each
 * kind's largest statistic on the first `features` features, the share of each kind adjusted until the paths
 * that pass any boundary are `rate` of all.
 */
export function fitBoundaries(
  paths: readonly StablePath[],
  looks: number,
  rate: number,
  features: number,
): FittedBoundaries {
  const rows = paths.map((path) => path.features.slice(0, features));
  const maxima = paths.map((path) => path.maxima.find((one) => one.looks === looks)!.values);
  const kinds = Array.from(maxima[0].keys());
  let share = (1.15 * rate) / kinds.length;
  let coefficients: Float64Array[] = [];
  for (let round = 0; round < 4; round++) {
    coefficients = kinds.map((kind) =>
      quantileRegression(
        rows,
        maxima.map((values) => values[kind]),
        1 - share,
      ),
    );
    const passing = rows.filter((row, path) =>
      kinds.some((kind) => maxima[path][kind] >= dot(coefficients[kind], row)),
    );
    share *= (rate * rows.length) / passing.length;
  }
  return { coefficients, share };
}

/** Constant to add to a kind's boundary so that `share` of the paths pass it at another number of looks. */
export function shiftForLooks(
  paths: readonly StablePath[],
  looks: number,
  kind: number,
  coefficients: Float64Array,
  share: number,
): number {
  const excess = paths.flatMap((path) => {
    const found = path.maxima.find((one) => one.looks === looks);
    return found === undefined ? [] : [found.values[kind] - dot(coefficients, path.features)];
  });
  excess.sort((a, b) => a - b);
  return excess[Math.floor((1 - share) * excess.length)];
}

function dot(weights: Float64Array, row: readonly number[]): number {
  let sum = 0;
  for (let i = 0; i < weights.length; i++) sum += weights[i] * row[i];
  return sum;
}
