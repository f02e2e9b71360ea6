import { addMonths } from "date-fns";
import type { ObjectStore } from "../store/objectStore.ts";
import { asOfFromKey } from "./keys.ts";

/** What the store shows of runs around one instant. */
export interface RunHistory {
  /** Instant of the newest run with a plan, if any. */
  readonly newest: string | undefined;
  /** Notes that a sender claimed and that have no proof of delivery: the key of the first claim. */
  readonly undelivered: readonly string[];
}

/** Month prefixes from a month before `asOf` to the later of `asOf` and now: listing them stays cheap for ever. */
function monthPrefixes(asOf: string, now: Date): string[] {
  const last = new Date(Math.max(now.getTime(), new Date(asOf).getTime())).toISOString().slice(0, 7);
  const prefixes: string[] = [];
  for (let back = -1; ; back++) {
    const month = addMonths(new Date(`${asOf.slice(0, 7)}-15T12:00:00Z`), back)
      .toISOString()
      .slice(0, 7);
    if (month > last) return prefixes;
    if (prefixes.length === 14) return ["runs/"]; // a replay of old times: one full listing is simpler
    prefixes.push(`runs/${month}`);
  }
}

/** Reads the newest run and the open deliveries from one listing of `runs/`. */
export async function readRunHistory(store: ObjectStore, asOf: string, now: Date): Promise<RunHistory> {
  const keys: string[] = [];
  for (const prefix of monthPrefixes(asOf, now))
    for (const entry of await store.list(prefix)) keys.push(entry.key);
  const all = new Set(keys);
  const newest = keys
    .filter((key) => key.endsWith("/plan.json"))
    .map((key) => asOfFromKey(key.split("/")[1]))
    .filter((instant) => instant !== undefined)
    .sort()
    .at(-1);
  const undelivered = keys.filter(
    (key) => /\/delivering-[^/.]+\.json$/.test(key) && !all.has(key.replace("/delivering-", "/delivered-")),
  );
  return { newest, undelivered };
}

/**
 * The newest run before an instant that worded its message: one that was planned and never closed told nobody anything.
 * Looks into the month and the one before; where runs are rarer, into the year and the one before.
 */
export async function toldRunBefore(store: ObjectStore, asOf: string): Promise<string | undefined> {
  const year = Number(asOf.slice(0, 4));
  const monthBefore = addMonths(new Date(`${asOf.slice(0, 7)}-15T12:00:00Z`), -1)
    .toISOString()
    .slice(0, 7);
  for (const parts of [
    [asOf.slice(0, 7), monthBefore],
    [`${year}-`, `${year - 1}-`],
  ]) {
    const listed = await Promise.all(parts.map((part) => store.list(`runs/${part}`)));
    const told = listed
      .flat()
      .filter(({ key }) => key.endsWith("/message-business.json"))
      .map(({ key }) => asOfFromKey(key.split("/")[1]))
      .filter((instant) => instant !== undefined && instant < asOf)
      .sort()
      .at(-1);
    if (told !== undefined) return told;
  }
  return undefined;
}
