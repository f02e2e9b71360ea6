import type { AverageForecast } from "./averageForecast.ts";
import { normalOfReach } from "./calibration.ts";
import type { ForecastOptions, LimitChance } from "./forecast.ts";
import { shockResponse } from "./memberFit.ts";
import { normalProbability } from "./normal.ts";
import { normalDraws } from "./normalDraws.ts";
import { spreadScore } from "./predictiveSpread.ts";

/** Simulated paths for the chance that any period passes: its Monte Carlo error is at most 0.8 points, */
const MOST_PATHS = 4000;
/** and for a horizon of hundreds, where a path costs its square, at most 2.3. */
const FEWEST_PATHS = 500;
const WORK = 2e7;

/**
 * Chance that each coming period passes a limit, from the same distribution as the intervals, and that any does, by
 * simulation (steps before `from` are past and not looked at; `coming` is what events add to the others): errors of neighbouring periods go together as the shock response of the heaviest candidate says.
 */
export function limitChances(
  average: AverageForecast,
  limits: NonNullable<ForecastOptions["limits"]>,
  coming: Float64Array,
  seed: number,
  from: number,
): LimitChance[] {
  const chances: LimitChance[] = [];
  if (limits.above !== undefined) chances.push(chanceOf(average, "above", limits.above, coming, seed, from));
  if (limits.below !== undefined) chances.push(chanceOf(average, "below", limits.below, coming, seed, from));
  return chances;
}

function chanceOf(
  average: AverageForecast,
  direction: "above" | "below",
  limit: number,
  coming: Float64Array,
  seed: number,
  from: number,
): LimitChance {
  const horizon = average.spread.medians.length;
  // How many normal deviations the limit lies on the passing side of the median.
  const away = new Float64Array(horizon);
  for (let h = from; h < horizon; h++) {
    const reach = spreadScore(average.spread, h, limit - coming[h - from]);
    away[h] = normalOfReach(average.calibration, reach) * (direction === "above" ? 1 : -1);
  }
  const each = away.subarray(from).map((distance) => normalProbability(-distance));
  let any = simulateAny(away, heaviestResponse(average, horizon), seed, from);
  // Simulation noise must not contradict what is known exactly.
  any = Math.max(any, ...each);
  any = Math.min(
    any,
    each.reduce((sum, chance) => sum + chance, 0),
    1,
  );
  return { direction, limit, each, any };
}

function heaviestResponse(average: AverageForecast, horizon: number): Float64Array {
  let heaviest = -1;
  average.fits.forEach((fit, i) => {
    if (fit !== undefined && (heaviest < 0 || average.shares[i] > average.shares[heaviest])) heaviest = i;
  });
  const fit = average.fits[heaviest];
  return fit === undefined ? new Float64Array(horizon).fill(1) : shockResponse(fit, horizon);
}

/** Share of simulated error paths that pass `away` in any period. */
function simulateAny(away: Float64Array, response: Float64Array, seed: number, from: number): number {
  const horizon = away.length;
  const size = new Float64Array(horizon);
  let power = 0;
  for (let h = 0; h < horizon; h++) {
    power += response[h] * response[h];
    size[h] = Math.sqrt(power);
  }
  const paths = Math.max(FEWEST_PATHS, Math.min(MOST_PATHS, Math.floor(WORK / horizon ** 2)));
  const draw = normalDraws(seed);
  const shocks = new Float64Array(horizon);
  let passed = 0;
  for (let path = 0; path < paths; path++) {
    let hit = false;
    for (let h = 0; h < horizon; h++) shocks[h] = draw();
    for (let h = 0; h < horizon && !hit; h++) {
      let error = 0;
      for (let j = 0; j <= h; j++) error += response[h - j] * shocks[j];
      hit = h >= from && error > away[h] * size[h];
    }
    if (hit) passed++;
  }
  return passed / paths;
}
