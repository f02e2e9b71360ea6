import { coefficients, lookShifts, tabulatedLooks, tabulatedRates } from "./boundaryCoefficients.ts";
import { boundaryFeatures, plainFeatures } from "./boundaryFeatures.ts";
import { watchedKinds } from "./lookState.ts";
import type { Reference } from "./reference.ts";

/**
 * Boundaries from the fitted table, or `undefined` outside it. Every boundary is a quantile of a kind's largest
 * statistic on stable series, regressed on what the reference shows (see boundaryFeatures): some 40,000
 * simulated series of many orders, persistences, tails and lengths, watched as the monitor watches, stand behind
 * each, so a boundary has less noise than a bootstrap of a thousand paths and costs a few multiplications. Since
 * the regression knows only the estimates, it carries their uncertainty, which a bootstrap from them does not.
 * The kinds pass their boundaries as often as spending says, together at the false-alarm rate.
 * Fitted apart for one lag and for more;
 * tabulated for 40 to 400 values, 8 to 104 looks and false-alarm rates of 1 to 20 %; linear in ln of both between.
 */
export function tabulatedBoundaries(
  reference: Reference,
  looks: number,
  falseAlarmRate: number,
): Float64Array | undefined {
  const length = reference.values.length;
  const outside =
    length < 40 ||
    length > 400 ||
    looks < tabulatedLooks[0] ||
    looks > tabulatedLooks[tabulatedLooks.length - 1] ||
    falseAlarmRate < tabulatedRates[0] ||
    falseAlarmRate > tabulatedRates[tabulatedRates.length - 1];
  if (outside) return undefined;
  const features = boundaryFeatures(reference);
  const kinds = watchedKinds(reference);
  const terms = kinds.length > 3;
  const at52 = (kind: string, rate: number): number => {
    const single = reference.order === 1 ? coefficients.oneLag : coefficients.moreLags;
    const plain = single[rate];
    if (!terms) return dot(plain[kind], features, plainFeatures);
    // With terms one rate is tabulated; others move as they do without terms.
    const like = plain[kind] ?? plain.level;
    const base = single[middleRate][kind] ?? single[middleRate].level;
    const own = coefficients.terms[kind];
    return (
      dot(own, features, own.length) + dot(like, features, plainFeatures) - dot(base, features, plainFeatures)
    );
  };
  const lowest = Math.max(0, lowestLevelBoundary - 0.75 * Math.max(0, Math.log(falseAlarmRate / 0.05)));
  const share = between(tabulatedRates, falseAlarmRate);
  const step = between(tabulatedLooks, looks);
  return Float64Array.from(kinds, (kind) => {
    const low = at52(kind, share.index);
    const high = at52(kind, share.index + 1);
    const shifts = lookShifts[kind] ?? lookShifts.level;
    const shift = shifts[step.index] + step.part * (shifts[step.index + 1] - shifts[step.index]);
    const boundary = low + share.part * (high - low) + shift;
    return kind === "level" ? Math.max(boundary, lowest) : boundary;
  });
}

/**
 * Near a unit root a level cannot be judged: its statistic stays low and so would its boundary, until one heavy shock
 * passes it. So no notice of level without an average likelihood ratio of five, of less at rates above 5 %.
 */
const lowestLevelBoundary = Math.log(5);

/** Place of 5 % among the tabulated rates. */
const middleRate = tabulatedRates.indexOf(0.05);

function dot(weights: readonly number[], features: readonly number[], count: number): number {
  let sum = 0;
  for (let i = 0; i < count; i++) sum += weights[i] * features[i];
  return sum;
}

/** Place of `value` in the increasing `points`, on the log scale. */
function between(points: readonly number[], value: number): { index: number; part: number } {
  let index = 0;
  while (index < points.length - 2 && points[index + 1] <= value) index++;
  return { index, part: Math.log(value / points[index]) / Math.log(points[index + 1] / points[index]) };
}
