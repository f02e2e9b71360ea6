import type { Calibration } from "./calibration.ts";
import { preparations } from "./candidates.ts";
import type { DescriptionPlan } from "./describingModel.ts";
import type { BackTest } from "./forecast.ts";
import { workingScales } from "./workingScale.ts";

/** Of the bank of candidates, its weights and its calibration: to be raised when any of them changes its meaning. */
const choiceVersion = 3;

/**
 * What the past of a series decided: plain data that survives JSON. Deciding takes most of the time of a forecast, and
 * rolling-origin evidence comes in horizons: until a whole new one has been seen, deciding again repeats the evidence.
 * A forecast made by a standing choice fits its models to all values it is given.
 */
export interface ForecastChoice {
  readonly version: number;
  /** Periods it was made on. */
  readonly length: number;
  /** Names of the working scales, season lengths and steps ahead that it was made with. */
  readonly scales: readonly string[];
  readonly seasons: readonly number[];
  readonly horizon: number;
  /** Terms and order of the describing model; `null` when no likelihood describes the series. */
  readonly describing: DescriptionPlan | null;
  /** Weight of each candidate in the order of the bank, 0 for those that carry nothing. */
  readonly weights: readonly number[];
  readonly calibration: Calibration;
  /** Record of the average, with `null` where nothing could be measured. */
  readonly backTest: {
    readonly origins: number;
    readonly meanAbsoluteError: readonly (number | null)[];
    readonly naiveMeanAbsoluteError: readonly (number | null)[];
    readonly relativeError: number | null;
    readonly coverage80: number | null;
  };
  /** Season of the naive forecast that does better, 0 for the last value; `null` when the average is used. */
  readonly naiveSeason: number | null;
}

/** A past that grew or shrank by more than this share is another past. */
const sameLength = 1 / 8;

/**
 * Whether a choice was made for a series of this kind and length: same scales, seasons and steps ahead, the same bank, and
 * about as much of a past.
 */
export function choiceFits(
  choice: ForecastChoice,
  known: Float64Array,
  seasons: readonly number[],
  horizon: number,
): boolean {
  if (choice.version !== choiceVersion) return false;
  if (Math.abs(known.length - choice.length) > sameLength * choice.length) return false;
  const observed = known.filter((value) => !Number.isNaN(value));
  const scales = workingScales(observed, seasons.length === 0).map(({ name }) => name);
  const same = (a: readonly unknown[], b: readonly unknown[]) => a.join() === b.join();
  const described = scales.some((name) => name === choice.describing?.scale) ? 1 : 0;
  const members = preparations(seasons).reduce((sum, { drifts }) => sum + drifts.length, 0);
  return (
    choice.horizon === horizon &&
    same(choice.scales, scales) &&
    same(choice.seasons, seasons) &&
    choice.weights.length === scales.length * members + described
  );
}

/** A choice just made, with what tells later whether it fits. */
export function choiceOf(
  known: Float64Array,
  decided: Omit<ForecastChoice, "version" | "length">,
): ForecastChoice {
  return { version: choiceVersion, length: known.length, ...decided };
}

const orNull = (value: number): number | null => (Number.isFinite(value) ? value : null);
const orNaN = (value: number | null): number => value ?? Number.NaN;

export function storedBackTest(backTest: BackTest): ForecastChoice["backTest"] {
  return {
    origins: backTest.origins,
    meanAbsoluteError: Array.from(backTest.meanAbsoluteError, orNull),
    naiveMeanAbsoluteError: Array.from(backTest.naiveMeanAbsoluteError, orNull),
    relativeError: orNull(backTest.relativeError),
    coverage80: orNull(backTest.coverage80),
  };
}

export function backTestFrom(stored: ForecastChoice["backTest"]): BackTest {
  return {
    origins: stored.origins,
    meanAbsoluteError: Float64Array.from(stored.meanAbsoluteError, orNaN),
    naiveMeanAbsoluteError: Float64Array.from(stored.naiveMeanAbsoluteError, orNaN),
    relativeError: orNaN(stored.relativeError),
    coverage80: orNaN(stored.coverage80),
  };
}
