import { requireValues, requireWhole } from "../autoregression/checks.ts";
import { tabulate } from "../numeric/tabulate.ts";
import { afterChange } from "./afterChange.ts";
import { assembleForecast } from "./assembleForecast.ts";
import { averageForecast } from "./averageForecast.ts";
import { boundsOf, chancesWithin, within } from "./bounds.ts";
import { type DescriptionPlan, describeAs, planDescription } from "./describingModel.ts";
import type { Forecast, ForecastOptions, ForecastPlan } from "./forecast.ts";
import { choiceFits, choiceOf } from "./forecastChoice.ts";
import { leadingZeros } from "./leadingZeros.ts";
import { seasonLengths } from "./seasonLengths.ts";
import { intermittentLevel, lastLevel, simpleForecast, steadyLevel } from "./simpleForecast.ts";
import { areWhole, betweenWholeNumbers, inWholeNumbers } from "./wholeNumbers.ts";

/** Fewest observed values that a model is fitted to. */
const LEAST_OBSERVED = 8;
/** Values looked at: what lies further back costs time and says little of the coming periods. */
const LONGEST_HISTORY = 5000;
/** Squares of larger values, and so their variance, are no numbers any more. */
const LARGEST = 1e150;
/** Fewest values since a lasting change that are forecast from alone. */
const LEAST_SINCE_CHANGE = 24;
/** Share of zeros from which a series that is never negative counts as intermittent. */
const INTERMITTENT = 0.4;

/**
 * Forecasts a series by an average of autoregressions, with its distribution, its record and what was decided.
 *
 * Candidates: levels about a mean or line, first, second and seasonal differences, with seasonal profiles shrunk by
 * evidence and three kinds of drift, on the raw and a variance-stabilising scale, each an average over orders; and
 * the describing model. Weights are the likelihood of the rolling-origin errors on this very series; the average is
 * the weighted middle half at each step. Ranges come from the shock responses, widened by how the average did in the
 * past. A series too short, constant, mostly gaps or mostly zeros is forecast by the simplest honest rule and says so.
 * Zeros from before a series began are left out, a series that was zero several times and never less stays so, and
 * ranges of whole numbers are whole numbers.
 *
 * `values`: one a period, `NaN` for a gap; a trailing gap is a period that is past but was not observed, so the
 * first forecast is still for the period after the last entry. All outputs are finite and ordered: low ≤ median ≤
 * high, point within the widest range, wider levels outside narrower ones. Deterministic; `seed` only steers the
 * simulated chance of passing a limit in any period.
 *
 * Throws `TypeError`/`RangeError` naming the argument, and `RangeError` when nothing was observed.
 *
 * @example forecastSeries(values, { horizon: 8, levels: [80, 95], period: "week" }).point
 */
export function forecastSeries(values: ArrayLike<number>, options: ForecastOptions): Forecast {
  checkOptions(values, options);
  const given = tabulate(values.length, (t) => values[t]);
  const began = leadingZeros(given);
  const observed = given.subarray(began).filter((value) => !Number.isNaN(value));
  const bounds = boundsOf(observed, options.bounds);
  const whole = areWhole(observed);
  const limits = whole ? betweenWholeNumbers(options.limits) : options.limits;
  const { effects = new Float64Array(given.length + options.horizon), ...rest } = options;
  // What an event took below a bound was no more than what was there.
  const plain = given.map((value, t) => (effects[t] === 0 ? value : within(value - effects[t], bounds)));
  const coming = effects.subarray(given.length);
  const forecast = forecastFrom(began, plain, { ...rest, bounds, limits, coming });
  const chances = forecast.chances.map((chance) => ({
    ...chance,
    limit: options.limits?.[chance.direction] ?? chance.limit,
  }));
  return {
    ...forecast,
    ...(whole ? inWholeNumbers(forecast, bounds) : {}),
    chances: chancesWithin(chances, bounds),
    notes: began === 0 ? forecast.notes : [{ code: "zeros-first", index: began }, ...forecast.notes],
  };
}

/** The forecast of `values` from index `began` on. */
function forecastFrom(began: number, values: Float64Array, options: ForecastPlan): Forecast {
  let first = began;
  while (Number.isNaN(values[first])) first++;
  const series = values.subarray(first);
  let end = series.length;
  while (Number.isNaN(series[end - 1])) end--;
  const whole = series.subarray(Math.max(0, end - LONGEST_HISTORY), end);
  const season = seasonLengths(whole.length, options)[0] ?? 0;
  const dropped = first + end - whole.length;
  const changedAt = options.changedAt === undefined ? undefined : options.changedAt - dropped;
  let known = afterChange(whole, changedAt, Math.max(LEAST_SINCE_CHANGE, 4 * season), season);
  // A cut may fall on a gap, and what follows is fitted from an observed value on.
  while (Number.isNaN(known[0])) known = known.subarray(1);
  const start = dropped + whole.length - known.length;
  const observed = known.filter((value) => !Number.isNaN(value));
  // Periods that are past but unobserved are forecast over and dropped.
  const late = series.length - end;
  const simple = simpleTreatment(known, observed, options, late);
  if (simple !== undefined) return simple;
  const seasons = seasonLengths(known.length, options);
  const steps = options.horizon + late;
  const { choice } = options;
  if (choice && choiceFits(choice, known, seasons, steps)) {
    const { describing } = choice;
    const description = describing === null ? undefined : tryDescribe(known, describing);
    if (describing === null || description !== undefined) {
      const { average } = averageForecast(known, seasons, steps, description, choice);
      return assembleForecast(average, choice, description, known, options, late, start);
    }
  }
  const plan = tryPlan(known, options);
  const description = plan === null ? undefined : tryDescribe(known, plan);
  const { average, choice: decided } = averageForecast(known, seasons, steps, description);
  return assembleForecast(
    average,
    choiceOf(known, { ...decided, describing: description === undefined ? null : plan }),
    description,
    known,
    options,
    late,
    start,
  );
}

function checkOptions(values: ArrayLike<number>, options: ForecastOptions): void {
  const { horizon, levels, bounds, limits, effects, changedAt } = options;
  requireValues("forecastSeries", "values", values, "gaps-allowed");
  requireWhole("forecastSeries", "horizon", horizon, 1);
  for (const level of levels) {
    if (!(level > 0 && level < 100)) {
      throw new RangeError(`forecastSeries needs levels between 0 and 100 percent, got ${level}`);
    }
  }
  const { low = Number.NEGATIVE_INFINITY, high = Number.POSITIVE_INFINITY } = bounds ?? {};
  if (!(low <= high)) throw new RangeError(`forecastSeries needs bounds in order, got ${low} to ${high}`);
  if (changedAt !== undefined) requireWhole("forecastSeries", "changedAt", changedAt, 0);
  if (effects !== undefined) {
    requireValues("forecastSeries", "effects", effects, "no-gaps");
    if (effects.length !== values.length + horizon) {
      throw new RangeError(
        `forecastSeries needs effects for ${values.length} values and ${horizon} coming ones, got ${effects.length}`,
      );
    }
  }
  for (const limit of [limits?.above, limits?.below]) {
    if (limit !== undefined && !Number.isFinite(limit)) {
      throw new RangeError(`forecastSeries needs finite limits, got ${limit}`);
    }
  }
  for (let t = 0; t < values.length; t++) {
    if (Math.abs(values[t]) > LARGEST) {
      throw new RangeError(
        `forecastSeries needs values of at most ${LARGEST} in size, got ${values[t]} at index ${t}`,
      );
    }
  }
  for (let t = 0; t < values.length; t++) if (!Number.isNaN(values[t])) return;
  throw new RangeError(`forecastSeries needs at least one observed value, got ${values.length} gaps`);
}

/** The forecast of a series that no model should be fitted to, `undefined` for any other. */
function simpleTreatment(
  series: Float64Array,
  observed: Float64Array,
  options: ForecastPlan,
  late: number,
): Forecast | undefined {
  const count = observed.length;
  if (count < LEAST_OBSERVED) {
    const note = { code: "too-short", observed: count } as const;
    return simpleForecast(series, options, lastLevel(series, late), [note]);
  }
  if (observed.every((value) => value === observed[0])) {
    const note = { code: "constant", value: observed[0], observed: count } as const;
    return simpleForecast(series, options, steadyLevel(observed), [note]);
  }
  if (count < 0.4 * series.length) {
    const note = { code: "mostly-gaps", observed: count, periods: series.length } as const;
    return simpleForecast(series, options, steadyLevel(observed), [note]);
  }
  const zeros = observed.filter((value) => value === 0).length / count;
  const season = seasonLengths(series.length, options)[0] ?? 0;
  const mostlyZero = zeros >= INTERMITTENT && observed.every((value) => value >= 0);
  if (mostlyZero && !zerosFollowSeason(series, season)) {
    const note = { code: "intermittent", shareOfZeros: zeros } as const;
    return simpleForecast(series, options, intermittentLevel(observed), [note]);
  }
  return undefined;
}

/**
 * Whether zeros come at fixed places of the season (a closed summer): where each place is foretold to be what it mostly
 * is, no more than a tenth as many values are otherwise as there are of the rarer kind, zeros or not.
 */
function zerosFollowSeason(series: Float64Array, season: number): boolean {
  if (season < 2) return false;
  const zeros = new Float64Array(season);
  const seen = new Float64Array(season);
  series.forEach((value, t) => {
    if (Number.isNaN(value)) return;
    seen[t % season]++;
    if (value === 0) zeros[t % season]++;
  });
  const otherwise = zeros.reduce((sum, zero, place) => sum + Math.min(zero, seen[place] - zero), 0);
  const ofZeros = zeros.reduce((sum, zero) => sum + zero, 0);
  const ofOthers = seen.reduce((sum, one) => sum + one, 0) - ofZeros;
  return otherwise <= 0.1 * Math.min(ofZeros, ofOthers);
}

/** A series may be forecast that no likelihood describes (a perfect line): then it has no describing model. */
const tryPlan = (known: Float64Array, options: ForecastPlan) =>
  orNothing(() => planDescription(known, options)) ?? null;
const tryDescribe = (known: Float64Array, plan: DescriptionPlan) => orNothing(() => describeAs(known, plan));

function orNothing<T>(work: () => T): T | undefined {
  try {
    return work();
  } catch (error) {
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}
