import type { ComparisonFacts, ModelFacts, SeriesFacts } from "./facts.ts";
import { toldFading } from "./fading.ts";
import type { Speech } from "./speech.ts";
import type { Statistics } from "./statistics.ts";
import { takesPart } from "./takesPart.ts";
import { textTable } from "./textTable.ts";

/** Order, scale and terms of the describing model, and how the forecast follows from it. */
export function modelLine(model: ModelFacts, speech: Speech, tell: Statistics): string {
  const terms = [
    model.scale === "log" ? "logarithms" : "the values as they are",
    model.trend ? "a linear trend" : "no trend",
    model.season > 0 ? `a season of ${speech.write(model.season, 1)} ${speech.facts.period}s` : "no season",
  ].join(", ");
  const weight = `weight ${tell.coefficient(model.weight)}`;
  const part = takesPart(model)
    ? `one of an average, with ${weight}`
    : `it describes how shocks fade, but has no part to speak of in the forecast (${weight})`;
  return `Model: autoregression of order ${model.order} on ${terms}; ${speech.write(model.observations, 1)} values; ${part}.${mixture(speech.facts)}`;
}

/** After a change the model still rests on both sides of it, until enough has come; its numbers lie between the two. */
function mixture({ findings, model }: SeriesFacts): string {
  const mixed = findings.some((one) => one.code === "change" && one.after.observations < model.observations);
  return mixed ? " It rests on values from both sides of the change: what holds since stands above." : "";
}

/** What the data say of shocks, after the sum of the coefficients. */
const fadingWords = {
  fades: "the data say that shocks fade",
  swings: "the data say that no shift lasts, but not how soon the swings after a shock die out",
  permanent: "the data do not contradict permanent shocks",
  "cannot-tell": "the data cannot tell fading from permanent shocks",
} as const;

/** Half-life with its 90 % interval, where the data can tell one. */
function halfLifeLines(model: ModelFacts, speech: Speech, tell: Statistics): string[] {
  const { halfLife, halfLifeRange: range, order } = model;
  const { period } = speech.facts;
  if (!toldFading(model).hasHalfLife) return [];
  if (order === 0) return [`Half-life of a shock: less than 1 ${period}; nothing is left of it by then.`];
  const end = (value: number | null) => (value === null ? "no bound" : tell.size(value));
  const half = halfLife === null ? "infinite: shocks do not fade" : `${tell.size(halfLife)} ${period}s`;
  return [`Half-life of a shock: ${half} (90% interval ${end(range.low)} to ${end(range.high)}).`];
}

/** Persistence, half-life, long-run level, shock size and rhythm, a line each. */
export function meaningLines(model: ModelFacts, speech: Speech, tell: Statistics): string[] {
  const { rhythm, longRunLevel, longRunLevelStandardError: levelError } = model;
  const periods = `${speech.facts.period}s`;
  const inUnit = speech.unit === null ? "" : ` ${speech.unit}`;
  const onScale = model.scale === "log" ? " (of the logarithm)" : inUnit;
  const level = levelError === null ? "" : ` (standard error ${tell.size(levelError)})`;
  const spread =
    model.longRunStandardDeviation === null
      ? "; no bounded spread around it"
      : `; standard deviation around it ${tell.size(model.longRunStandardDeviation)}${inUnit}`;
  return [
    `Persistence (sum of coefficients): ${tell.coefficient(model.persistence)}; ${fadingWords[toldFading(model).verdict]}.`,
    ...halfLifeLines(model, speech, tell),
    `Long-run level: ${tell.size(longRunLevel)}${inUnit}${level}${spread}.`,
    `Shock size (standard deviation of the innovations): ${tell.size(model.shockSize)}${onScale}.`,
    rhythm
      ? `Rhythm: a cycle of ${tell.size(rhythm.length)} ${periods}, damped by ${tell.coefficient(rhythm.damping)} a ${speech.facts.period}.`
      : "Rhythm: none (no complex pair of roots).",
  ];
}

/** Old against new, coefficient by coefficient. */
export function comparisonLines(
  comparison: ComparisonFacts,
  date: string,
  speech: Speech,
  tell: Statistics,
): string[] {
  const { halfLife, persistence } = comparison;
  const life = (value: number | null) => (value === null ? "infinite" : tell.size(value));
  const lives = toldFading(speech.facts.model).hasHalfLife
    ? `; half-life ${life(halfLife.before)} then, ${life(halfLife.after)} ${speech.facts.period}s now`
    : "";
  const rows = comparison.coefficients.map((one) => [
    `lag ${one.lag}`,
    tell.coefficient(one.before),
    tell.coefficient(one.after),
    tell.signed(one.difference),
    tell.coefficient(one.standardError),
  ]);
  return [
    `Against the model of ${date}: order ${comparison.orderBefore} then, ${comparison.orderAfter} now; persistence ${tell.coefficient(persistence.before)} then, ${tell.coefficient(persistence.after)} now${lives}.`,
    ...(rows.length > 0
      ? textTable([["coefficient", "old", "new", "difference", "std. error"], ...rows])
      : ["No coefficients then or now: the series has no memory in either model."]),
  ];
}

/** The coefficients alone, when there is no earlier model to compare with. */
export function coefficientLines(model: ModelFacts, tell: Statistics): string[] {
  if (model.order === 0) return ["No coefficients: the series shows no memory."];
  const rows = model.coefficients.map((value, index) => [
    `lag ${index + 1}`,
    tell.coefficient(value),
    tell.coefficient(model.standardErrors[index] ?? null),
  ]);
  return textTable([["coefficient", "value", "std. error"], ...rows]);
}

/** Whether the model leaves structure in its residuals. */
export function diagnosticsLine(model: ModelFacts, tell: Statistics): string {
  const largest = model.residualAutocorrelations.reduce(
    (best, value, index) => (Math.abs(value) > Math.abs(best.value) ? { value, lag: index + 1 } : best),
    { value: 0, lag: 0 },
  );
  const autocorrelation =
    largest.lag > 0
      ? ` Largest residual autocorrelation ${tell.signed(largest.value)} at lag ${largest.lag}.`
      : "";
  if (!model.ljungBox) return `Residuals: too few for a test of whiteness.${autocorrelation}`;
  const { statistic, degreesOfFreedom, pValue } = model.ljungBox;
  const verdict =
    pValue < 0.05 ? "structure is left: treat the rest with care" : "no structure left that the test sees";
  return `Residuals: Ljung-Box ${tell.size(statistic)} on ${degreesOfFreedom} degrees of freedom, ${tell.pValue(pValue)}: ${verdict}.${autocorrelation}`;
}
