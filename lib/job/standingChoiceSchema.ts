import * as z from "zod/mini";
import { numbers, orNull, period } from "./schemaParts.ts";
import type { StandingChoice } from "./standingChoice.ts";

/** What a forecast decided, in a model document. */
export const standingChoiceSchema = z.object({
  lastPeriod: period,
  changedAt: z.nullable(period),
  basis: z.string(),
  simulated: z.object({
    halfLifeRange: z.object({ low: orNull, high: orNull }),
    fading: z.enum(["fades", "permanent", "cannot-tell"]),
    coefficients: numbers,
    observations: z.number(),
  }),
  choice: z.object({
    version: z.number(),
    length: z.number(),
    scales: z.array(z.string()),
    seasons: numbers,
    horizon: z.number(),
    describing: z.nullable(
      z.object({
        scale: z.enum(["raw", "log"]),
        trend: z.boolean(),
        season: z.number(),
        order: z.number(),
      }),
    ),
    weights: numbers,
    calibration: z.object({
      narrow: z.number(),
      wide: z.number(),
      freedom: z.number(),
    }),
    backTest: z.object({
      origins: z.number(),
      meanAbsoluteError: z.array(orNull),
      naiveMeanAbsoluteError: z.array(orNull),
      relativeError: orNull,
      coverage80: orNull,
    }),
    naiveSeason: orNull,
  }),
}) satisfies z.ZodMiniType<StandingChoice>;
