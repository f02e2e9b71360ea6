import { normalProbability } from "../numeric/gammaFunctions.ts";

/** Deterministic terms of a Dickey–Fuller regression. */
export type DeterministicTerms = "none" | "constant" | "trend";

export interface CriticalValue {
  /** Chance of passing the value when the null hypothesis holds. */
  readonly significance: number;
  readonly value: number;
}

interface ResponseSurface {
  /** Coefficients of 1, 1/n, 1/n², 1/n³ at 1, 5 and 10 %. */
  readonly critical: readonly (readonly number[])[];
  /** Statistics outside have p-value 0 or 1; `turn` parts the two polynomials. */
  readonly least: number;
  readonly turn: number;
  readonly greatest: number;
  /** Φ⁻¹(p) as a polynomial in the statistic, below and above `turn`. */
  readonly lower: readonly number[];
  readonly upper: readonly number[];
}

const SIGNIFICANCE = [0.01, 0.05, 0.1];

// Critical values: MacKinnon (2010), Queen's University working paper 1227, table 2 (no terms: MacKinnon 1996).
// p-values: MacKinnon (1994), Journal of Business & Economic Statistics 12, tables 3 and 4.
const DICKEY_FULLER: Record<DeterministicTerms, ResponseSurface> = {
  none: {
    critical: [
      [-2.56574, -2.2358, -3.627, 0],
      [-1.941, -0.2686, -3.365, 31.223],
      [-1.61682, 0.2656, -2.714, 25.364],
    ],
    least: -19.04,
    turn: -1.04,
    greatest: Number.POSITIVE_INFINITY,
    lower: [0.6344, 1.2378, 0.032496],
    upper: [0.4797, 0.93557, -0.06999, 0.033066],
  },
  constant: {
    critical: [
      [-3.43035, -6.5393, -16.786, -79.433],
      [-2.86154, -2.8903, -4.234, -40.04],
      [-2.56677, -1.5384, -2.809, 0],
    ],
    least: -18.83,
    turn: -1.61,
    greatest: 2.74,
    lower: [2.1659, 1.4412, 0.038269],
    upper: [1.7339, 0.93202, -0.12745, -0.010368],
  },
  trend: {
    critical: [
      [-3.95877, -9.0531, -28.428, -134.155],
      [-3.41049, -4.3904, -9.036, -45.374],
      [-3.12705, -2.5856, -3.925, -22.38],
    ],
    least: -16.18,
    turn: -2.89,
    greatest: 0.7,
    lower: [3.2512, 1.6047, 0.049588],
    upper: [2.5261, 0.61654, -0.37956, -0.060285],
  },
};

// The DF-GLS statistic of Elliott, Rothenberg & Stock (1996): response surfaces of the same forms, simulated by
// K. Sheppard (constants of the Python package arch, module unitroot/critical_values/dfgls).
const DICKEY_FULLER_GLS: Record<"constant" | "trend", ResponseSurface> = {
  constant: {
    critical: [
      [-2.56781793, -20.5575392, 182.727674, -1778.66664],
      [-1.94363325, -21.7272746, 260.815068, -2269.14916],
      [-1.61998241, -23.2734708, 306.474378, -2574.83557],
    ],
    least: -17.561302895,
    turn: -0.479507609,
    greatest: 13.36536151,
    lower: [0.67422739, 1.25475826, 0.03572509],
    upper: [0.50612497, 0.98305664, -0.05648525, 0.00140875],
  },
  trend: {
    critical: [
      [-3.40689134, -21.69971242, 27.26295939, -816.84404772],
      [-2.84677178, -19.69109364, 84.7664136, -799.40722401],
      [-2.55890707, -19.42621991, 116.53759752, -840.31342847],
    ],
    least: -13.681153543,
    turn: -2.196040437,
    greatest: 8.737433837,
    lower: [2.38767685, 1.57454737, 0.05754439],
    upper: [2.60561421, 1.67850224, 0.0373599, -0.01017936],
  },
};

/**
 * Critical values at 1, 5 and 10 % of the Dickey–Fuller t statistic for `observations` rows (infinite allowed).
 *
 * @example dickeyFullerCriticalValues("constant", 25) // -3.7239, -2.9865, -2.6328
 */
export function dickeyFullerCriticalValues(terms: DeterministicTerms, observations: number): CriticalValue[] {
  return criticalValues(DICKEY_FULLER[terms], observations);
}

/** The same for DF-GLS. */
export function dickeyFullerGlsCriticalValues(trend: boolean, observations: number): CriticalValue[] {
  return criticalValues(DICKEY_FULLER_GLS[trend ? "trend" : "constant"], observations);
}

/**
 * Large-sample chance of a Dickey–Fuller t statistic this low or lower under a unit root.
 *
 * @example dickeyFullerPValue("constant", -2.86154) // 0.05
 */
export function dickeyFullerPValue(terms: DeterministicTerms, statistic: number): number {
  return leftTail(DICKEY_FULLER[terms], statistic);
}

/** The same for DF-GLS. */
export function dickeyFullerGlsPValue(trend: boolean, statistic: number): number {
  return leftTail(DICKEY_FULLER_GLS[trend ? "trend" : "constant"], statistic);
}

function criticalValues(surface: ResponseSurface, observations: number): CriticalValue[] {
  return surface.critical.map((row, i) => ({
    significance: SIGNIFICANCE[i],
    value: polynomial(row, 1 / observations),
  }));
}

function leftTail(surface: ResponseSurface, statistic: number): number {
  if (statistic > surface.greatest) return 1;
  if (statistic < surface.least) return 0;
  const row = statistic <= surface.turn ? surface.lower : surface.upper;
  return normalProbability(polynomial(row, statistic));
}

function polynomial(coefficients: readonly number[], x: number): number {
  let sum = 0;
  for (let i = coefficients.length - 1; i >= 0; i--) sum = sum * x + coefficients[i];
  return sum;
}
