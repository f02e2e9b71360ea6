import * as z from "zod/mini";
import type { Behaviour, ChangeKind, Evidence } from "./notice.ts";

// What of a notice is stored, in the watch and in the findings made of it.

export const changeKindSchema = z.enum([
  "persistence",
  "level",
  "trend",
  "shock-size",
  "season",
]) satisfies z.ZodMiniType<ChangeKind>;

export const behaviourSchema = z.object({
  order: z.number(),
  coefficients: z.array(z.number()),
  persistence: z.number(),
  halfLife: z.nullable(z.number()),
  level: z.number(),
  slope: z.number(),
  shockSize: z.number(),
  observations: z.number(),
}) satisfies z.ZodMiniType<Behaviour>;

export const evidenceSchema = z.object({
  statistic: z.number(),
  boundary: z.number(),
  looksUsed: z.number(),
  looks: z.number(),
  passed: z.optional(z.object({ kind: changeKindSchema, statistic: z.number(), look: z.number() })),
  falseAlarmRate: z.number(),
  caution: z.optional(z.literal("clustered-shocks")),
}) satisfies z.ZodMiniType<Evidence>;
