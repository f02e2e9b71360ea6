import { halfLife } from "../dynamics/halfLife.ts";
import { type HalfLifeInterval, halfLifeInterval } from "../dynamics/halfLifeInterval.ts";
import { shockFading } from "../dynamics/shockFading.ts";
import type { DescribingModel } from "../forecast/forecast.ts";
import type { ModelFacts } from "../words/facts.ts";
import { orNull } from "./orNull.ts";

/** Fewer values say nothing about permanence. */
const shortestTested = 30;

/**
 * Whether shocks fade, by tests of both hypotheses; with gaps, which the tests do not take, by whether the range of the
 * half-life has an end.
 */
function fadingOf(values: Float64Array, trend: boolean, halfLife: HalfLifeInterval): ModelFacts["fading"] {
  const observed = values.filter((value) => !Number.isNaN(value));
  if (observed.length < shortestTested || observed.every((value) => value === observed[0]))
    return "cannot-tell";
  if (observed.length < values.length) return Number.isFinite(halfLife.high) ? "fades" : "cannot-tell";
  return shockFading(values, { trend, halfLife }).verdict;
}

/** The range of the half-life and the verdict on fading, with the fit they were simulated for. */
export interface SimulatedFading extends Pick<ModelFacts, "halfLifeRange" | "fading"> {
  readonly coefficients: readonly number[];
  readonly observations: number;
}

/** How far a coefficient may move, in its standard errors, before what was simulated around it is simulated anew. */
const smallMove = 0.25;
/** And by what share the number of values may grow. */
const smallGrowth = 1 / 16;

/** Whether what was simulated for an earlier fit of the same model still describes this one. */
function stillDescribes(earlier: SimulatedFading, fit: DescribingModel["fit"], life: number | null): boolean {
  const { coefficients, observations, halfLifeRange } = earlier;
  const end = (value: number | null) => value ?? Number.POSITIVE_INFINITY;
  return (
    Math.abs(fit.observations - observations) <= smallGrowth * observations &&
    coefficients.length === fit.coefficients.length &&
    coefficients.every(
      (value, lag) => Math.abs(value - fit.coefficients[lag]) <= smallMove * fit.standardErrors[lag],
    ) &&
    end(life) >= end(halfLifeRange.low) &&
    end(life) <= end(halfLifeRange.high)
  );
}

/**
 * The range of the half-life by simulation, and whether shocks fade by tests: a third of the time of an account, so what
 * was found for an earlier fit is kept while it still describes this one. `values` are departures from the model's terms.
 */
export function simulateFading(
  model: DescribingModel,
  values: Float64Array,
  earlier?: SimulatedFading,
): SimulatedFading {
  const { fit, trend } = model;
  if (earlier && stillDescribes(earlier, fit, orNull(halfLife(fit.coefficients)))) return earlier;
  const interval = halfLifeInterval(fit, { estimated: trend ? "trend" : "estimate" });
  return {
    halfLifeRange: { low: orNull(interval.low), high: orNull(interval.high) },
    fading: fadingOf(values, trend, interval),
    coefficients: Array.from(fit.coefficients),
    observations: fit.observations,
  };
}
