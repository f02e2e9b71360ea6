import type { ChangeKind } from "../../lib/drift/notice.ts";
import { spendingOf } from "../../lib/drift/spending.ts";
import { quantileRegression } from "./quantileRegression.ts";
import type { StablePath } from "./stablePaths.ts";

/** Regression of each kind's boundary, the kinds exceeded as spending says and together at the false-alarm rate. */
export interface FittedBoundaries {
  readonly coefficients: Readonly<Record<string, Float64Array>>;
  /** How often a kind with an equal part of the spending passes its boundary alone. */
  readonly share: number;
}

/**
 * Share of the population's paths to pass: more than the rate, because the population holds more of what is hard
 * (short references, three and four lags, roots near one) than is common, where the rate then is about what it is
 * called; the difference fades at high rates.
 */
const populationRate = (rate: number) => rate * (1.19 - 0.8 * rate);

/** Places of the features that tell the tails. */
const tailFeatures = { first: 10, last: 15 };

/**
 * Boundaries for `looks` looks at the false-alarm rate `rate` from stable paths: quantile regressions of each
 * kind's largest statistic on the features, the share of each kind adjusted until the paths that pass any boundary
 * are `rate` of all (see populationRate). A kind is fitted on the paths that watch it.
 */
export function fitBoundaries(
  paths: readonly StablePath[],
  kinds: readonly ChangeKind[],
  looks: number,
  rate: number,
  rowOf: (path: StablePath, kind: ChangeKind) => readonly number[],
): FittedBoundaries {
  const samples = kinds.map((kind) => {
    const own = paths.filter((path) => path.kinds.includes(kind));
    return {
      kind,
      own,
      rows: own.map((path) => rowOf(path, kind)),
      maxima: own.map((path) => largest(path, kind, looks)),
    };
  });
  let share = (1.15 * populationRate(rate)) / kinds.length;
  const coefficients: Record<string, Float64Array> = {};
  for (let round = 0; round < 4; round++) {
    const passing = new Set<StablePath>();
    for (const { kind, own, rows, maxima } of samples) {
      const fitted = quantileRegression(rows, maxima, 1 - share * spendingOf(kind), coefficients[kind]);
      coefficients[kind] = fitted;
      own.forEach((path, n) => {
        if (maxima[n] >= dot(fitted, rows[n])) passing.add(path);
      });
    }
    if (round < 3) share *= (populationRate(rate) * paths.length) / passing.size;
  }
  return { coefficients, share };
}

/**
 * The features a kind's boundary is regressed on, others 0. Only the level's uses the tails: for the others the
 * tails a reference happens to show mislead, so that its boundary would be high for normal shocks and low for heavy
 * ones.
 */
export function ownFeatures(path: StablePath, kind: ChangeKind, count: number): number[] {
  const blind = kind === "persistence" || kind === "shock-size";
  return path.features
    .slice(0, count)
    .map((value, i) => (blind && i >= tailFeatures.first && i <= tailFeatures.last ? 0 : value));
}

/** Constant to add to a kind's boundary so that `share` of the paths pass it at another number of looks. */
export function shiftForLooks(
  paths: readonly StablePath[],
  looks: number,
  kind: ChangeKind,
  coefficients: Float64Array,
  share: number,
): number {
  const excess = paths
    .filter((path) => path.maxima.some((one) => one.looks === looks))
    .map((path) => largest(path, kind, looks) - dot(coefficients, path.features));
  excess.sort((a, b) => a - b);
  return excess[Math.floor((1 - share * spendingOf(kind)) * excess.length)];
}

function largest(path: StablePath, kind: ChangeKind, looks: number): number {
  const found = path.maxima.find((one) => one.looks === looks);
  return found === undefined ? Number.NEGATIVE_INFINITY : found.values[path.kinds.indexOf(kind)];
}

function dot(weights: Float64Array, row: readonly number[]): number {
  let sum = 0;
  for (let i = 0; i < weights.length; i++) sum += weights[i] * row[i];
  return sum;
}
