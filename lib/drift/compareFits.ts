/** What of a fit is compared: live, or as numbers read back from a store. */
export interface ComparableFit {
  readonly order: number;
  readonly coefficients: ArrayLike<number>;
  readonly standardErrors: ArrayLike<number>;
  readonly observations: number;
}

export interface FitComparison {
  readonly orderBefore: number;
  readonly orderAfter: number;
  readonly coefficients: readonly {
    readonly lag: number;
    readonly before: number | null;
    readonly after: number | null;
    /** A lag that a fit does not have counts as zero. */
    readonly difference: number;
    /** `null` when the samples leave nothing to judge it by. */
    readonly standardError: number | null;
  }[];
}

/**
 * Two fits of one series, the later on the earlier's values and those that came since. The later estimate is
 * efficient on the larger sample, so the two differ only by what the new values taught, and the variance of the
 * difference is the difference of the variances (Hausman 1978), not their sum:
 * Var(φ̂_after − φ̂_before) = Var φ̂_before − Var φ̂_after. Both variances are taken with the later fit's
 * precision a value, se²·n, so that the difference is never negative: se_after² · (n_after/n_before − 1).
 * For analysts to read; by itself it is no notice, because it is looked at every run.
 *
 * @example compareFits(lastWeek, thisWeek).coefficients[0].difference
 */
export function compareFits(before: ComparableFit, after: ComparableFit): FitComparison {
  const lags = Math.max(before.order, after.order);
  return {
    orderBefore: before.order,
    orderAfter: after.order,
    coefficients: Array.from({ length: lags }, (_, at) => {
      const old = at < before.order ? before.coefficients[at] : null;
      const now = at < after.order ? after.coefficients[at] : null;
      return {
        lag: at + 1,
        before: old,
        after: now,
        difference: (now ?? 0) - (old ?? 0),
        standardError: standardError(before, after, at),
      };
    }),
  };
}

function standardError(before: ComparableFit, after: ComparableFit, at: number): number | null {
  // Of two orders, neither is a refit of the other: a coefficient takes over what its neighbours held.
  if (before.order !== after.order) return null;
  const error = after.standardErrors[at];
  const growth = after.observations / before.observations - 1;
  return Number.isFinite(error) && growth > 0 ? error * Math.sqrt(growth) : null;
}
