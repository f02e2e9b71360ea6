import { asOfText } from "../../lib/job/keys.ts";

/** What a schedule, or a person, asks of the scheduled function. */
export type ScheduledRequest =
  | { readonly kind: "run"; readonly asOf: string }
  | { readonly kind: "watch"; readonly withinHours: number };

/** A piece of work for one worker of the fleet: some portions of a plan. */
export interface PortionRequest {
  readonly asOf: string;
  readonly tables: readonly string[];
}

/** An invocation that none of the functions understands. */
export class EventError extends Error {
  override readonly name = "EventError";
}

/**
 * Reads the scheduled function's event: `{ "asOf": "2026-11-30T06:00:00Z" }` (the schedule gives its own time,
 * so that a repeated trigger names the same run), `{ "asOf": "now" }` by hand, or `{ "watch": { "withinHours": 336 } }`.
 *
 * @throws EventError naming what was expected
 */
export function scheduledRequest(event: unknown, now: Date): ScheduledRequest {
  const { asOf, watch } = fields(event, "the scheduled function");
  if (watch !== undefined) {
    const { withinHours } = fields(watch, "watch");
    if (typeof withinHours !== "number" || !(withinHours > 0))
      throw new EventError("watch needs withinHours, a number above 0");
    return { kind: "watch", withinHours };
  }
  return { kind: "run", asOf: asOf === "now" ? asOfText(now) : instant(asOf) };
}

/**
 * Reads what the Distributed Map hands a worker: `{ BatchInput: { asOf }, Items: [{ tables: [...] }, ...] }`.
 *
 * @throws EventError naming what was expected
 */
export function portionRequest(event: unknown): PortionRequest {
  const { BatchInput, Items } = fields(event, "the portion function");
  const { asOf } = fields(BatchInput, "BatchInput");
  if (!Array.isArray(Items)) throw new EventError("the portion function needs Items, a list of portions");
  const tables = Items.flatMap((item) => {
    const { tables: own } = fields(item, "an item");
    if (!Array.isArray(own) || !own.every((table): table is string => typeof table === "string"))
      throw new EventError("an item needs tables, a list of names");
    return own;
  });
  return { asOf: instant(asOf), tables };
}

/** What closing is told of the fleet's run. */
export interface ClosingRequest {
  readonly asOf: string;
  /** When the fleet started, and why it was the fleet's; absent when a person invokes the function. */
  readonly startedAt: string | undefined;
  readonly because: string | undefined;
}

/**
 * Reads the closing function's event: `{ "asOf": "2026-11-30T06:00:00Z", "startedAt": "…", "because": "…" }`.
 *
 * @throws EventError naming what was expected
 */
export function closingRequest(event: unknown): ClosingRequest {
  const { asOf, startedAt, because } = fields(event, "the closing function");
  return {
    asOf: instant(asOf),
    startedAt: startedAt === undefined ? undefined : instant(startedAt),
    because: typeof because === "string" ? because : undefined,
  };
}

function fields(value: unknown, name: string): Readonly<Record<string, unknown>> {
  if (typeof value !== "object" || value === null || Array.isArray(value))
    throw new EventError(`${name} needs a JSON object`);
  return value as Record<string, unknown>;
}

function instant(value: unknown): string {
  if (
    typeof value !== "string" ||
    !/^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}(:\d{2}(\.\d+)?)?(Z|[+-]\d{2}:\d{2})$/.test(value)
  )
    throw new EventError("asOf must be an ISO instant with its zone, such as 2026-11-30T06:00:00Z");
  return asOfText(value);
}
