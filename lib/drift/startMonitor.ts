import { boundariesFor } from "./boundaries.ts";
import { watchedKinds } from "./lookState.ts";
import { type Monitor, type MonitorSettings, toStored } from "./monitor.ts";
import { fitReference } from "./reference.ts";
import { termColumns } from "./terms.ts";

export interface StartOptions extends Partial<MonitorSettings> {
  readonly looks: number;
  readonly falseAlarmRate: number;
  /** Autoregressive order; chosen from the values when absent. */
  readonly order?: number;
  /** `bootstrap` simulates the boundaries from this reference even where the fitted table would do. */
  readonly boundaries?: "table" | "bootstrap";
}

/** Fewest observed values a monitor can be started on, besides two for each column of the regression. */
export const fewestValues = 30;

/**
 * Starts a monitor: fits the reference autoregression on `values` (gaps `NaN`, interpolated; single gross
 * outliers taken out) and sets the boundaries that hold the chance of any lasting notice over `looks` looks at
 * `falseAlarmRate` while the series stays as it is. The result is plain data; `advanceMonitor` takes it on.
 *
 * @throws RangeError when there are too few values, or all are the same
 * @example startMonitor(loans, { looks: 52, falseAlarmRate: 0.05 })
 */
export function startMonitor(values: ArrayLike<number>, options: StartOptions): Monitor {
  const { looks, falseAlarmRate, seed = 1, trend = false, season = 0 } = options;
  requireSettings(looks, falseAlarmRate, season, options.order);
  const given = Float64Array.from(values);
  const observed = given.reduce((sum, value) => sum + (Number.isNaN(value) ? 0 : 1), 0);
  const columns = termColumns({ trend, season }) + (options.order ?? 1);
  const needed = fewestValues + 2 * columns;
  if (observed < needed)
    throw new RangeError(`startMonitor needs at least ${needed} values that are not gaps, got ${observed}`);
  const maxOrder = Math.max(1, Math.min(8, Math.floor(observed / 12)));
  const reference = fitReference(given, { trend, season }, options.order, maxOrder);
  const { boundaries, source } = boundariesFor(reference, {
    looks,
    falseAlarmRate,
    seed,
    bootstrap: options.boundaries === "bootstrap",
  });
  return {
    schema: "monitor",
    version: 1,
    looks,
    falseAlarmRate,
    seed,
    trend,
    season,
    order: reference.order,
    reference: toStored(given),
    values: [],
    looksUsed: 0,
    boundarySource: source,
    boundaries: watchedKinds(reference).map((kind, index) => ({ kind, boundary: boundaries[index] })),
    statistics: watchedKinds(reference).map(() => []),
    change: null,
    surprises: [],
  };
}

function requireSettings(looks: number, rate: number, season: number, order: number | undefined): void {
  if (!Number.isInteger(looks) || looks < 4)
    throw new RangeError(`startMonitor needs looks to be a whole number of at least 4, got ${looks}`);
  if (!(rate > 0 && rate < 1))
    throw new RangeError(`startMonitor needs a falseAlarmRate between 0 and 1, got ${rate}`);
  if (!Number.isInteger(season) || season < 0)
    throw new RangeError(`startMonitor needs season to be a whole number of periods, got ${season}`);
  if (order !== undefined && (!Number.isInteger(order) || order < 1))
    throw new RangeError(`startMonitor needs order to be a whole number of at least 1, got ${order}`);
}
