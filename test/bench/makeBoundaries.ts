import { writeFileSync } from "node:fs";
import { plainFeatures } from "../../lib/drift/boundaryFeatures.ts";
import { watchedKinds } from "../../lib/drift/lookState.ts";
import { type FittedBoundaries, fitBoundaries, shiftForLooks } from "./fitBoundaries.ts";
import { quantileRegression } from "./quantileRegression.ts";
import { type StablePath, watchStablePath } from "./stablePaths.ts";

const rates = [0.01, 0.02, 0.05, 0.1, 0.2];
const looks = [8, 13, 26, 52, 104];
const plans = [4, 7, 12, 24].flatMap((season) => [true, false].map((trend) => ({ trend, season })));
const plainKinds = watchedKinds({ trend: false, season: 0 });
const rounded = (values: ArrayLike<number>) => Array.from(values, (value) => Math.round(value * 1e3) / 1e3);

/**
 * Simulates stable series, fits the boundaries and writes them as JSON to `file`: what
 * lib/drift/boundaryCoefficients.ts holds. About ten minutes on one core.
 */
export function makeBoundaries(file: string): void {
  const plain = draw(40_000, (at) =>
    watchStablePath(1001 + at * 2_654_435, { trend: false, season: 0 }, at % 6 === 5 ? 104 : 52),
  );
  const one = plain.filter(isOneLag);
  const fitted = (paths: readonly StablePath[]) =>
    rates.map((rate) => fitBoundaries(paths, 52, rate, plainFeatures));
  const oneLag = fitted(one);
  const termPlans = [...plans, { trend: true, season: 0 }, { trend: true, season: 0 }];
  const withTerms = draw(9000, (at) =>
    watchStablePath(777 + at * 2_654_435, termPlans[at % termPlans.length], 52),
  );
  const middle = oneLag[rates.indexOf(0.05)];
  const table = {
    oneLag: oneLag.map(byKind),
    moreLags: fitted(plain.filter((path) => !isOneLag(path))).map(byKind),
    terms: termBoundaries(withTerms),
    lookShifts: Object.fromEntries(
      plainKinds.map((kind, index) => [
        kind,
        rounded(looks.map((count) => shift(one, count, index, middle))),
      ]),
    ),
  };
  writeFileSync(file, `${JSON.stringify(table, null, 2)}\n`);
}

const draw = (count: number, path: (at: number) => StablePath) =>
  Array.from({ length: count }, (_, at) => path(at));
/** The largest root is a feature of higher orders only. */
const isOneLag = (path: StablePath) => path.features[6] === 0;
const byKind = (fitted: FittedBoundaries) =>
  Object.fromEntries(plainKinds.map((kind, index) => [kind, rounded(fitted.coefficients[index])]));

function shift(paths: readonly StablePath[], count: number, kind: number, fitted: FittedBoundaries): number {
  return count === 52 ? 0 : shiftForLooks(paths, count, kind, fitted.coefficients[kind], fitted.share);
}

/** With trend or season, at 5 %: each kind over all plans that watch it, one share for all. */
function termBoundaries(paths: readonly StablePath[]): Record<string, number[]> {
  const kinds = watchedKinds({ trend: true, season: 7 });
  let share = 0.0135;
  let fitted: Record<string, Float64Array> = {};
  const largest = (path: StablePath, kind: string) =>
    path.maxima.find((one) => one.looks === 52)!.values[path.kinds.indexOf(kind as never)];
  // Where only references with a line watch a kind, the line is no feature beside the constant.
  const row = (path: StablePath, kind: string) =>
    path.features.map((value, i) => (kind === "trend" && i === plainFeatures ? 0 : value));
  for (let round = 0; round < 4; round++) {
    fitted = Object.fromEntries(
      kinds.map((kind) => {
        const own = paths.filter((path) => path.kinds.includes(kind));
        const response = own.map((path) => largest(path, kind));
        return [
          kind,
          quantileRegression(
            own.map((path) => row(path, kind)),
            response,
            1 - share,
          ),
        ];
      }),
    );
    const passing = paths.filter((path) =>
      path.kinds.some((kind) => {
        const boundary = row(path, kind).reduce((sum, value, i) => sum + value * fitted[kind][i], 0);
        return largest(path, kind) >= boundary;
      }),
    );
    share *= (0.05 * paths.length) / passing.length;
  }
  return Object.fromEntries(kinds.map((kind) => [kind, rounded(fitted[kind])]));
}
