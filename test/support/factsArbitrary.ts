import fc from "fast-check";
import type { ChangeKind } from "../../lib/drift/notice.ts";
import { periodStart } from "../../lib/series/periods.ts";
import type { Period } from "../../lib/series/series.ts";
import type { Finding, SeriesFacts } from "../../lib/words/facts.ts";
import { quay } from "./factsFixture.ts";

// Random facts, wild but possible: sizes over ten powers of ten, gaps, infinite half-lives, near ties.

const sign = fc.constantFrom(-1, 1);
/** A size between a thousandth and a hundred million, log-uniform. */
export const size = fc.double({ min: -3, max: 8, noNaN: true }).map((power) => 10 ** power);
export const signedSize = fc.tuple(size, sign).map(([value, side]) => value * side);
const coefficient = fc.double({ min: -1.2, max: 1.2, noNaN: true });
export const periodKind: fc.Arbitrary<Period> = fc.constantFrom(
  "hour",
  "day",
  "week",
  "month",
  "quarter",
  "year",
);
const kinds: readonly ChangeKind[] = ["persistence", "level", "trend", "shock-size", "season"];

export const lastPeriodOf: Record<Period, string> = {
  hour: "2026-11-30T05:00:00Z",
  day: "2026-11-29",
  week: "2026-11-23",
  month: "2026-10-01",
  quarter: "2026-07-01",
  year: "2025-01-01",
};

const halfLife = fc.oneof(
  fc.constant(null),
  fc.double({ min: 0.1, max: 60, noNaN: true }),
  fc.double({ min: 0.1, max: 4, noNaN: true }),
);
const behaviour = fc.record({
  order: fc.integer({ min: 0, max: 6 }),
  coefficients: fc.array(coefficient, { maxLength: 6 }),
  persistence: coefficient,
  halfLife,
  level: signedSize,
  slope: fc.oneof(fc.constant(0), signedSize),
  shockSize: size,
  observations: fc.integer({ min: 3, max: 500 }),
});

export const changeOf = (period: Period): fc.Arbitrary<Extract<Finding, { code: "change" }>> =>
  fc.record({
    code: fc.constant("change" as const),
    kind: fc.constantFrom(...kinds),
    alternative: fc.option(fc.constantFrom(...kinds)),
    status: fc.constantFrom("provisional" as const, "confirmed" as const),
    fresh: fc.constant(true),
    noticed: fc.constant(lastPeriodOf[period]),
    change: fc.tuple(fc.nat(30), fc.nat(10), fc.nat(10)).map(([back, before, after]) => ({
      period: periodStart(lastPeriodOf[period], period, -back),
      low: periodStart(lastPeriodOf[period], period, -back - before),
      high: periodStart(lastPeriodOf[period], period, Math.min(0, after - back)),
    })),
    before: behaviour,
    after: behaviour,
    evidence: fc.record({
      statistic: fc.double({ min: 1, max: 50, noNaN: true }),
      boundary: fc.double({ min: 1, max: 4, noNaN: true }),
      looksUsed: fc.integer({ min: 1, max: 52 }),
      looks: fc.constant(52),
      falseAlarmRate: fc.constant(0.05),
    }),
  });

export const surpriseOf = (period: Period): fc.Arbitrary<Extract<Finding, { code: "surprise" }>> =>
  fc.tuple(signedSize, signedSize, fc.array(signedSize, { maxLength: 4 })).map(([value, expected, left]) => ({
    code: "surprise" as const,
    period: lastPeriodOf[period],
    value,
    expected,
    size: value > expected ? 5 : -5,
    remaining: left.map((amount, index) => ({
      after: index + 1,
      period: periodStart(lastPeriodOf[period], period, index + 1),
      amount,
    })),
  }));

/** A series of any step whose numbers are random and belong together only as far as sentences need. */
export const seriesOf = (
  period: Period,
  findings: fc.Arbitrary<readonly Finding[]>,
): fc.Arbitrary<SeriesFacts> =>
  fc
    .record({
      findings,
      horizon: fc.integer({ min: 1, max: 12 }),
      values: fc.array(fc.option(signedSize, { freq: 8 }), { minLength: 3, maxLength: 40 }),
      width: size,
      chance: fc.double({ min: 0, max: 1, noNaN: true }),
      shock: signedSize,
      fading: fc.double({ min: -0.95, max: 1, noNaN: true }),
      whole: fc.boolean(),
    })
    .map(({ findings, horizon, values, width, chance, shock, fading, whole }) => {
      const last = lastPeriodOf[period];
      const history = values.map((value) => (value === null || !whole ? value : Math.round(value)));
      const point = Array.from(
        { length: horizon },
        (_, step) => (history.at(-1) ?? 10) + shock * fading ** (step + 1),
      );
      const periods = point.map((_, step) => periodStart(last, period, step + 1));
      const total = point.reduce((sum, one) => sum + one, 0);
      return {
        ...quay,
        period,
        history: { start: periodStart(last, period, 1 - history.length), values: history },
        lastPeriod: last,
        observed: history.filter((value) => value !== null).length,
        gaps: history.filter((value) => value === null).length,
        forecast: {
          ...quay.forecast,
          periods,
          point,
          median: point,
          intervals: [
            { level: 80, low: point.map((one) => one - width), high: point.map((one) => one + width) },
          ],
          total: {
            point: total,
            intervals: [{ level: 80, low: total - width * horizon, high: total + width * horizon }],
          },
          chances: [{ direction: "above" as const, limit: 420, each: point.map(() => chance), any: chance }],
        },
        model: { ...quay.model, shockSize: Math.abs(shock) },
        attribution: {
          longRunLevel: 100,
          shocks: [{ period: last, shock, effects: point.map((_, step) => shock * fading ** (step + 1)) }],
        },
        findings,
      };
    });
