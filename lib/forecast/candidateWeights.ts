import { median } from "./median.ts";
import { horizonsCovered, type Origin } from "./rollingOrigins.ts";

/**
 * What is known of the size of a horizon's errors beforehand, beside what the horizon itself says of it (degrees of
 * freedom of the one over those of the other). It is known from the candidate in the middle: the best of many is
 * best by luck where little was seen, and one step that was hit would rule out all others. Set on the M1 and M4 sets
 * of the bench together, where 0.1 to 1 differ by less than their sampling error.
 */
const KNOWN_BEFORE = 0.15;

/**
 * Weights of candidates from their rolling-origin losses: exp(−power · (1 + b) · mean log(loss + b · typical)), the
 * mean over origins and over the scales that judge, b being `KNOWN_BEFORE` and `typical` the mean loss of the candidate
 * in the middle on that scale. It is the posterior of equally likely candidates whose errors are normal with a size
 * that is unknown and each origin's own (Student's likelihood), so that one wild horizon does not decide; which scale
 * they are normal on is not known either. With b = 0, one origin and one scale it is a power of the rule of Bates and
 * Granger (1969), inverse to the mean square.
 *
 * `losses[scale][origin]` holds each candidate's mean squared error, each error divided by the square root of its step
 * ahead so that far steps, whose errors grow like a random walk's, do not drown the near ones; `NaN` when it could not
 * be fitted there. `usable` marks candidates with a forecast to weigh. Without losses: equal weights.
 */
export function candidateWeights(
  losses: readonly (readonly Float64Array[])[],
  usable: (candidate: number) => boolean,
  count: number,
  power: number,
): Float64Array {
  const sizes = new Float64Array(count);
  for (const origins of losses) {
    const before = KNOWN_BEFORE * typicalLoss(origins, usable, count);
    for (let i = 0; i < count; i++) {
      let sum = 0;
      let seen = 0;
      for (const loss of origins) {
        if (Number.isNaN(loss[i])) continue;
        // Tiny losses of a perfect line have a logarithm too.
        sum += Math.log(Math.max(loss[i] + before, Number.MIN_VALUE));
        seen++;
      }
      sizes[i] += seen > 0 ? ((1 + KNOWN_BEFORE) * sum) / seen / losses.length : Number.NaN;
    }
  }
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0; i < count; i++) if (usable(i) && sizes[i] < least) least = sizes[i];
  const weights = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    if (least === Number.POSITIVE_INFINITY) weights[i] = usable(i) ? 1 : 0;
    else if (usable(i) && !Number.isNaN(sizes[i])) weights[i] = Math.exp(-power * (sizes[i] - least));
  }
  return weights;
}

/** The median of the candidates' mean losses; 0 when none has any. */
function typicalLoss(
  origins: readonly Float64Array[],
  usable: (candidate: number) => boolean,
  count: number,
): number {
  const means = new Float64Array(count).fill(Number.NaN);
  for (let i = 0; i < count; i++) {
    if (!usable(i)) continue;
    let sum = 0;
    let seen = 0;
    for (const loss of origins) {
      if (Number.isNaN(loss[i])) continue;
      sum += loss[i];
      seen++;
    }
    if (seen > 0) means[i] = sum / seen;
  }
  const typical = median(means);
  return Number.isNaN(typical) ? 0 : typical;
}

/**
 * Power for the evidence of so many independent horizons: half their number, for E independent errors of unknown size
 * have likelihood proportional to MSE^(−E/2); without evidence all weigh alike.
 */
export function weightPower(horizons: number): number {
  return horizons / 2;
}

/** How far ahead candidates were judged, and the power their losses were given. */
export interface Judged {
  readonly steps: number;
  readonly power: number;
}

export function judgedBy(origins: readonly Origin[]): Judged {
  const steps = origins.reduce((most, origin) => Math.max(most, origin.steps), 0);
  return { steps, power: weightPower(horizonsCovered(origins)) };
}

/**
 * Weights at step `h` (from 0), to `out`. Beyond the steps that were judged, a candidate is expected to lose more than
 * there by as much as its own error variance grows, and weighs less by the same power: a slope that wanders may have
 * foretold the next value, and says little of the eighteenth. `variances` by candidate, then step.
 */
export function weightsAhead(
  weights: Float64Array,
  variances: readonly Float64Array[],
  h: number,
  { steps, power }: Judged,
  out: Float64Array,
): void {
  for (let i = 0; i < weights.length; i++) {
    const beyond = weights[i] > 0 && h >= steps && steps > 0;
    // Largest values have variances past all numbers.
    const grown = beyond ? Math.min(variances[i][h] / variances[i][steps - 1], Number.MAX_VALUE) : 1;
    out[i] = grown > 1 ? weights[i] / grown ** power : weights[i];
  }
}
