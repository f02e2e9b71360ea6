import type { ObjectStore } from "../../lib/store/objectStore.ts";
import { openStore } from "../../lib/store/openStore.ts";
import { type WriteLine, writeStandardOutput } from "./log.ts";
import type { ReadSecret } from "./secrets.ts";
import type { FleetRun, StartFleet } from "./startFleet.ts";

/** When the scheduled function hands a run to the fleet. */
export type FleetChoice = "auto" | "always" | "never";

/** Everything outside that a handler touches; tests give their own. */
export interface Cloud {
  readonly store: ObjectStore;
  /** Tells deployments apart in metrics. */
  readonly deployment: string;
  readonly fleet: FleetChoice;
  readonly startFleet?: StartFleet | undefined;
  readonly readSecret: ReadSecret;
  readonly environment: Readonly<Record<string, string | undefined>>;
  readonly clock: () => number;
  readonly write: WriteLine;
}

/** The services a handler uses beside the store; it brings them, so that its bundle holds no client it never needs. */
export interface Services {
  readonly readSecret?: (secretId: string) => Promise<string | undefined>;
  readonly startFleet?: (stateMachineArn: string, run: FleetRun) => ReturnType<StartFleet>;
}

/**
 * The cloud as the stack's environment variables describe it.
 * @throws {Error} naming the variable that is missing
 */
export function cloudFrom(
  environment: Readonly<Record<string, string | undefined>>,
  { readSecret, startFleet }: Services,
): Cloud {
  const needed = (name: string) => {
    const value = environment[name];
    if (!value) throw new Error(`the environment variable ${name} is missing: the stack sets it`);
    return value;
  };
  const stateMachine = environment.EBBWIRE_STATE_MACHINE;
  const secret = environment.EBBWIRE_SECRET;
  return {
    store: openStore(needed("EBBWIRE_STORE"), environment),
    deployment: needed("EBBWIRE_DEPLOYMENT"),
    fleet: stateMachine ? (environment.EBBWIRE_FLEET === "always" ? "always" : "auto") : "never",
    startFleet: stateMachine && startFleet ? (run) => startFleet(stateMachine, run) : undefined,
    readSecret: async () => (secret ? readSecret?.(secret) : undefined),
    environment,
    clock: Date.now,
    write: writeStandardOutput,
  };
}

let standing: Cloud | undefined;

/** The cloud of this process, made at the first invocation and kept while the process stays warm. */
export function ownCloud(services: Services = {}): Cloud {
  standing ??= cloudFrom(process.env, services);
  return standing;
}
