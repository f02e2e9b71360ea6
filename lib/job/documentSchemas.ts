import * as z from "zod/mini";
import { behaviourSchema, changeKindSchema, evidenceSchema } from "../drift/noticeSchemas.ts";
import type { Finding, SeriesFacts } from "../words/facts.ts";
import type { ModelDocument, StoredSeries } from "./modelDocument.ts";
import { instant, numbers, orNull, period, say } from "./schemaParts.ts";
import { standingChoiceSchema } from "./standingChoiceSchema.ts";
import type { LastingSummary } from "./summary.ts";

// The documents other programs read, as schemas: published by `npm run schemas`, and held to the types they describe
// by the `satisfies` at the end of each.

const dated = z.object({ period, low: period, high: period });
const note = z.discriminatedUnion("code", [
  z.object({ code: z.literal("too-short"), observed: z.number() }),
  z.object({ code: z.literal("constant"), value: z.number(), observed: z.optional(z.number()) }),
  z.object({ code: z.literal("zeros-first"), index: z.number() }),
  z.object({ code: z.literal("mostly-gaps"), observed: z.number(), periods: z.number() }),
  z.object({ code: z.literal("intermittent"), shareOfZeros: z.number() }),
  z.object({ code: z.literal("naive-used"), relativeError: z.number() }),
  z.object({ code: z.literal("level-step"), index: z.number() }),
  z.object({ code: z.literal("outliers-damped"), indexes: numbers }),
]);

const finding = z.discriminatedUnion("code", [
  z.object({
    code: z.literal("change"),
    kind: changeKindSchema,
    alternative: z.nullable(changeKindSchema),
    status: z.enum(["provisional", "confirmed"]),
    fresh: z.boolean(),
    noticed: period,
    lookedBack: z.optional(z.boolean()).check(say("True when no run at the time of the notice told it.")),
    change: dated,
    before: behaviourSchema,
    after: behaviourSchema,
    evidence: evidenceSchema,
  }),
  z.object({
    code: z.literal("surprise"),
    period,
    value: z.number(),
    expected: z.number(),
    size: z.number(),
    remaining: z.array(z.object({ after: z.number(), period, amount: z.number() })),
  }),
  z.object({
    code: z.literal("past-break"),
    change: dated,
    levelBefore: z.number(),
    levelAfter: z.number(),
    pValue: z.number(),
  }),
  z.object({ code: z.literal("forecast-note"), note }),
  z.object({ code: z.literal("no-new-values"), since: period }),
  z.object({ code: z.literal("stale"), lastPeriod: period, periodsLate: z.number() }),
  z.object({
    code: z.literal("revised"),
    count: z.number(),
    firstPeriod: period,
    largest: z.object({ period, before: orNull, after: orNull }),
  }),
  z.object({ code: z.literal("incomplete-period"), period }),
  z.object({ code: z.literal("gaps"), count: z.number(), latest: period }),
  z.object({
    code: z.literal("event-effect"),
    name: z.string(),
    effect: z.number(),
    standardError: z.number(),
    coming: z.array(z.object({ period, amount: z.number() })),
  }),
]) satisfies z.ZodMiniType<Finding>;

const forecast = z.object({
  periods: z.array(period),
  point: numbers.check(say("Mean of the predictive distribution, one a period.")),
  median: numbers,
  intervals: z.array(z.object({ level: z.number(), low: numbers, high: numbers })),
  total: z.object({
    point: z.number(),
    intervals: z.array(z.object({ level: z.number(), low: z.number(), high: z.number() })),
  }),
  chances: z.array(
    z.object({ direction: z.enum(["above", "below"]), limit: z.number(), each: numbers, any: z.number() }),
  ),
  candidates: z.array(z.object({ name: z.string(), weight: z.number() })),
});

const model = z.object({
  scale: z.enum(["raw", "log"]),
  trend: z.boolean(),
  season: z.number(),
  relation: z.optional(z.enum(["is", "member"])).check(say("In older documents only.")),
  weight: z.number(),
  order: z.number(),
  coefficients: numbers,
  standardErrors: numbers,
  persistence: z.number().check(say("Sum of the coefficients.")),
  halfLife: orNull.check(say("Periods; null when shocks are permanent.")),
  halfLifeRange: z.object({ low: orNull, high: orNull }),
  longRunLevel: z.number(),
  longRunLevelStandardError: orNull,
  longRunStandardDeviation: orNull,
  shockSize: z.number().check(say("Standard deviation of the innovations.")),
  rhythm: z.nullable(z.object({ length: z.number(), damping: z.number() })),
  weights: numbers.check(say("Moving-average weights, ψ_0 first.")),
  residualAutocorrelations: numbers,
  ljungBox: z.nullable(z.object({ statistic: z.number(), degreesOfFreedom: z.number(), pValue: z.number() })),
  fading: z.enum(["fades", "permanent", "cannot-tell"]),
  observations: z.number(),
});

const comparison = z.object({
  since: instant,
  orderBefore: z.number(),
  orderAfter: z.number(),
  coefficients: z.array(
    z.object({
      lag: z.number(),
      before: orNull,
      after: orNull,
      difference: z.number(),
      standardError: orNull,
    }),
  ),
  persistence: z.object({ before: z.number(), after: z.number() }),
  halfLife: z.object({ before: orNull, after: orNull }),
});

const score = {
  forecasts: z.number(),
  insideRange: z.number(),
  meanAbsoluteError: z.number(),
  naiveMeanAbsoluteError: z.number(),
};

const facts = z.object({
  series: z.string(),
  unit: z.nullable(z.string()),
  adds: z.optional(z.boolean()).check(say("False when adding periods up means nothing.")),
  period: z.enum(["hour", "day", "week", "month", "quarter", "year"]),
  history: z.object({ start: period, values: z.array(orNull) }),
  lastPeriod: period,
  observed: z.number(),
  gaps: z.number(),
  forecast,
  model,
  comparison: z.nullable(comparison),
  attribution: z.nullable(
    z.object({
      longRunLevel: z.number(),
      shocks: z.array(z.object({ period, shock: z.number(), effects: numbers })),
    }),
  ),
  monitor: z.nullable(
    z.object({
      since: period,
      looksUsed: z.number(),
      looks: z.number(),
      falseAlarmRate: z.number(),
      paths: z.array(z.object({ kind: changeKindSchema, boundary: z.number(), statistics: z.array(orNull) })),
      state: z.enum(["watching", "relearning", "waiting-for-data"]),
    }),
  ),
  findings: z.array(finding),
  trackRecord: z.nullable(
    z.object({ ...score, level: z.number(), byHorizon: z.array(z.object({ step: z.number(), ...score })) }),
  ),
  backTest: z.object({ origins: z.number(), relativeError: orNull, coverage80: orNull }),
}) satisfies z.ZodMiniType<SeriesFacts>;

const problem = z.object({
  table: z.string(),
  line: z.optional(z.number()),
  column: z.optional(z.string()),
  code: z.string(),
  message: z.string(),
  remedy: z.string(),
  fatal: z.boolean(),
});

const storedSeries = z.object({
  facts,
  digest: z.string(),
  watchOrigin: z.string(),
  watch: z.unknown(),
  track: z.object({
    level: z.number(),
    steps: z.array(
      z.object({
        forecasts: z.number(),
        inside: z.number(),
        absoluteError: z.number(),
        naiveAbsoluteError: z.number(),
      }),
    ),
    pending: z.array(
      z.object({
        period,
        step: z.number(),
        point: z.number(),
        low: z.number(),
        high: z.number(),
        naive: z.number(),
      }),
    ),
  }),
  choice: z.optional(z.nullable(standingChoiceSchema)),
}) satisfies z.ZodMiniType<StoredSeries>;

/** `models/<table>/<asOf>.json`, of many series `.json.gz`. */
export const modelDocumentSchema = z.object({
  schema: z.literal(1),
  table: z.string(),
  asOf: instant,
  source: z.string().check(say("SHA-256 of the table's file.")),
  reading: z.unknown(),
  problems: z.array(problem),
  series: z.array(storedSeries),
}) satisfies z.ZodMiniType<ModelDocument>;

const failed = z.object({
  table: z.string(),
  beside: z.optional(z.boolean()),
  hasForecast: z.optional(z.boolean()),
  problems: z.array(problem),
});

/** `runs/<asOf>/summary.json`. */
export const summarySchema = z.object({
  schema: z.literal(1),
  asOf: instant,
  tables: z.number(),
  series: z.number(),
  notices: z.number(),
  surprises: z.number(),
  stale: z.array(z.string()),
  failed: z.array(failed),
  left: z.array(z.string()),
  gone: z.optional(z.array(z.string())),
  report: z.string(),
}) satisfies z.ZodMiniType<LastingSummary>;
