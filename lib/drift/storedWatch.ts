import * as z from "zod/mini";
import { behaviourSchema, changeKindSchema, evidenceSchema } from "./noticeSchemas.ts";
import type { Watch } from "./watchSeries.ts";

const values = z.array(z.nullable(z.number()));

const change = z.object({
  code: z.literal("change"),
  kind: changeKindSchema,
  alternative: z.nullable(changeKindSchema),
  status: z.enum(["provisional", "confirmed"]),
  noticedAt: z.number(),
  change: z.object({ index: z.number(), low: z.number(), high: z.number() }),
  before: behaviourSchema,
  after: behaviourSchema,
  evidence: evidenceSchema,
});

const settings = {
  looks: z.number(),
  falseAlarmRate: z.number(),
  seed: z.number(),
  trend: z.boolean(),
  season: z.number(),
};

/** A stored monitor of version 1. */
export const monitorSchema = z.object({
  schema: z.literal("monitor"),
  version: z.literal(1),
  ...settings,
  order: z.int().check(z.minimum(1)),
  reference: values,
  values,
  looksUsed: z.number(),
  boundarySource: z.enum(["table", "bootstrap"]),
  boundaries: z.array(z.object({ kind: changeKindSchema, boundary: z.number() })),
  statistics: z.array(values),
  change: z.nullable(change),
  surprises: z.array(z.number()),
});

/** A stored watch of version 1. */
export const watchSchema = z.object({
  schema: z.literal("watch"),
  version: z.literal(1),
  state: z.enum(["watching", "relearning", "waiting-for-data"]),
  settings: z.object(settings),
  regimeStart: z.number(),
  monitor: z.nullable(monitorSchema),
  monitorStart: z.number(),
  seenUntil: z.number(),
  changedAt: z.nullable(z.number()),
});

/**
 * Reads a watch from a stored document. Absent (`undefined`, `null`) is a first sight. Something that is no
 * watch, or one of a version this program does not know, is told apart with the reason, so that the caller can
 * start afresh and say so rather than fail.
 */
export function readWatch(
  stored: unknown,
): { readonly watch: Watch | undefined } | { readonly unreadable: string } {
  if (stored === undefined || stored === null) return { watch: undefined };
  const version = (stored as { version?: unknown }).version;
  if (typeof version === "number" && version > 1)
    return { unreadable: `the stored watch has version ${version}; this program reads version 1` };
  const read = watchSchema.safeParse(stored);
  if (read.success) return { watch: read.data };
  const [issue] = read.error.issues;
  return {
    unreadable: `the stored watch is not as expected at ${issue.path.join(".") || "its root"}: ${issue.message}`,
  };
}
