import { availableParallelism } from "node:os";
import { periods } from "../lib/series/periods.ts";
import type { Period } from "../lib/series/series.ts";
import type { ObjectStore } from "../lib/store/objectStore.ts";
import { openStore } from "../lib/store/openStore.ts";

/** The command line was not understood. */
export class UsageError extends Error {
  override readonly name = "UsageError";
}

export function storeOf(address: string | undefined): ObjectStore {
  if (!address) throw new UsageError("name the store: --store FOLDER or --store s3://bucket/prefix");
  try {
    return openStore(address);
  } catch (error) {
    throw new UsageError((error as Error).message);
  }
}

/** An instant from the command line; without one, the time now. */
export function instantOf(option: string, text: string | undefined): Date {
  if (text === undefined) return new Date();
  const date = new Date(text);
  // A zone must be named: without one the same words would mean another instant on another machine.
  if (!/^\d{4}-\d{2}-\d{2}T[\d:.]+(Z|[+-]\d{2}:?\d{2})$/.test(text) || Number.isNaN(date.getTime()))
    throw new UsageError(`--${option} takes an ISO instant such as 2026-11-30T06:00:00Z, not "${text}"`);
  return date;
}

export function periodOf(text: string): Period {
  const period = periods.find((one) => one === text);
  if (!period) throw new UsageError(`--every takes one of ${periods.join(", ")}, not "${text}"`);
  return period;
}

/** Threads to refit on: all processors but one unless said. */
export function workersOf(text: string | undefined): number {
  if (text === undefined) return Math.max(1, availableParallelism() - 1);
  const workers = Number(text);
  if (!Number.isInteger(workers) || workers < 1 || workers > 256)
    throw new UsageError(`--workers takes a whole number from 1 to 256, not "${text}"`);
  return workers;
}

/** `env:NAME` from the environment. `secret:` names live in the cloud's secret store, which a laptop does not ask. */
export async function localSecrets(reference: string): Promise<string | undefined> {
  return reference.startsWith("env:") ? process.env[reference.slice("env:".length)] : undefined;
}
