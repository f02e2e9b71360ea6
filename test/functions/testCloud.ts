import { readFileSync } from "node:fs";
import type { Cloud } from "../../functions/cloud/cloud.ts";
import type { LambdaContext } from "../../functions/cloud/lambda.ts";
import type { FleetRun } from "../../functions/cloud/startFleet.ts";
import type { ObjectStore } from "../../lib/store/objectStore.ts";
import { MemoryStore } from "../support/memoryStore.ts";

/** A sample of an invocation, as it lies in `events/`. */
export const sampleEvent = (name: string) => JSON.parse(readFileSync(`events/${name}.json`, "utf8"));

export interface TestCloud extends Cloud {
  readonly store: ObjectStore;
  readonly started: FleetRun[];
  // biome-ignore lint/suspicious/noExplicitAny: log lines are looked into freely
  readonly lines: () => any[];
}

/** A cloud in memory whose clock stands at a Monday morning and moves by a millisecond a look. */
export function testCloud(overrides: Partial<Cloud> = {}): TestCloud {
  const written: string[] = [];
  const started: FleetRun[] = [];
  let now = Date.parse("2026-11-30T06:00:05Z");
  return {
    store: new MemoryStore(),
    deployment: "Test/Ebbwire",
    fleet: "never",
    startFleet: async (run) => {
      const standing = started.some(({ name }) => name === run.name);
      started.push(run);
      return standing ? "standing" : "started";
    },
    readSecret: async () => undefined,
    environment: {},
    clock: () => now++,
    write: (line) => written.push(line),
    ...overrides,
    started,
    lines: () => written.map((line) => JSON.parse(line)),
  };
}

/** An invocation's context with this much time left at every look, or what `remaining` says. */
export function lambdaContext(remaining: number | (() => number) = 900_000): LambdaContext {
  return {
    awsRequestId: "c6af9ac6-7b61-11e6-9a41-93e8deadbeef",
    getRemainingTimeInMillis: () => (typeof remaining === "number" ? remaining : remaining()),
  };
}
