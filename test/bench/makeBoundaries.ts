import { writeFileSync } from "node:fs";
import { plainFeatures } from "../../lib/drift/boundaryFeatures.ts";
import { watchedKinds } from "../../lib/drift/lookState.ts";
import type { ChangeKind } from "../../lib/drift/notice.ts";
import { type FittedBoundaries, fitBoundaries, ownFeatures, shiftForLooks } from "./fitBoundaries.ts";
import { type StablePath, watchStablePath } from "./stablePaths.ts";

const rates = [0.01, 0.02, 0.05, 0.1, 0.2];
const looks = [8, 13, 26, 52, 104];
const plans = [4, 7, 12, 24].flatMap((season) => [true, false].map((trend) => ({ trend, season })));
const termPlans = [...plans, { trend: true, season: 0 }, { trend: true, season: 0 }];
const plainKinds = watchedKinds({ trend: false, season: 0 });
const allKinds = watchedKinds({ trend: true, season: 7 });

/**
 * Simulates stable series, fits the boundaries and writes them as JSON to `file`: what
 * lib/drift/boundaryCoefficients.ts holds. About ten minutes on one core.
 */
export function makeBoundaries(file: string): void {
  const plain = Array.from({ length: 40_000 }, (_, at) =>
    watchStablePath(1001 + at * 2_654_435, { trend: false, season: 0 }, at % 8 === 7 ? 104 : 52),
  );
  const withTerms = Array.from({ length: 9000 }, (_, at) =>
    watchStablePath(777 + at * 2_654_435, termPlans[at % termPlans.length], 52),
  );
  writeFileSync(file, `${JSON.stringify(tableOf(plain, withTerms), null, 2)}\n`);
}

function tableOf(plain: readonly StablePath[], withTerms: readonly StablePath[]) {
  const one = plain.filter(isOneLag);
  const fitted = (paths: readonly StablePath[]) =>
    rates.map((rate) =>
      fitBoundaries(paths, plainKinds, 52, rate, (path, kind) => ownFeatures(path, kind, plainFeatures)),
    );
  const oneLag = fitted(one);
  const middle = oneLag[rates.indexOf(0.05)];
  return {
    oneLag: oneLag.map(rounded),
    moreLags: fitted(plain.filter((path) => !isOneLag(path))).map(rounded),
    terms: rounded(fitBoundaries(withTerms, allKinds, 52, 0.05, termRow)),
    lookShifts: Object.fromEntries(
      plainKinds.map((kind) => [kind, looks.map((count) => round(shift(one, count, kind, middle)))]),
    ),
  };
}

const round = (value: number) => Math.round(value * 1e3) / 1e3;
/** The largest root is a feature of higher orders only. */
const isOneLag = (path: StablePath) => path.features[6] === 0;
const rounded = ({ coefficients }: FittedBoundaries) =>
  Object.fromEntries(Object.entries(coefficients).map(([kind, own]) => [kind, Array.from(own, round)]));

function shift(
  paths: readonly StablePath[],
  count: number,
  kind: ChangeKind,
  fitted: FittedBoundaries,
): number {
  return count === 52 ? 0 : shiftForLooks(paths, count, kind, fitted.coefficients[kind], fitted.share);
}

/** Where only references with a line watch a kind, the line is no feature beside the constant. */
function termRow(path: StablePath, kind: ChangeKind): number[] {
  return ownFeatures(path, kind, path.features.length).map((value, i) =>
    kind === "trend" && i === plainFeatures ? 0 : value,
  );
}
