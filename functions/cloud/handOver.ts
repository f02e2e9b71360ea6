import { encodeDocument } from "../../lib/job/documents.ts";
import { asOfKey, runPrefix } from "../../lib/job/keys.ts";
import type { Plan } from "../../lib/job/summary.ts";
import type { Cloud } from "./cloud.ts";
import type { Log } from "./log.ts";

/** Why a run went to the fleet. */
export type FleetReason = "chosen for this deployment" | "more work than one function has time for";

/** The scheduled function's answer when the fleet goes on. */
export interface HandedOver {
  readonly outcome: "handed over";
  readonly asOf: string;
  readonly because: FleetReason;
  readonly portions: number;
  readonly execution: "started" | "standing";
}

/**
 * Gives a planned run to the fleet: writes `runs/<asOf>/portions.json`, the array the Distributed Map reads, and
 * starts an execution named after the run. Repeating it writes the same bytes and starts nothing new.
 *
 * @throws {Error} when the deployment has no fleet
 */
export async function handOver(
  cloud: Cloud,
  log: Log,
  plan: Plan,
  because: FleetReason,
): Promise<HandedOver> {
  if (cloud.startFleet === undefined) throw new Error("this deployment has no fleet to hand the run to");
  const portionsKey = `${runPrefix(plan.asOf)}portions.json`;
  const items = plan.portions.map((tables, index) => ({ portion: index + 1, tables }));
  await cloud.store.create(portionsKey, encodeDocument(items));
  const prefix = keyPrefix(cloud.store.address);
  const execution = await cloud.startFleet({
    name: `run-${asOfKey(plan.asOf)}`,
    input: {
      asOf: plan.asOf,
      portionsKey: prefix + portionsKey,
      resultsPrefix: `${prefix}${runPrefix(plan.asOf)}fleet`,
      because,
    },
  });
  log.info("the fleet takes the run", { because, portions: items.length, execution });
  return { outcome: "handed over", asOf: plan.asOf, because, portions: items.length, execution };
}

/** What stands before every key of the store in its bucket: Step Functions reads the bucket itself. */
function keyPrefix(address: string): string {
  const [, ...parts] = address.replace(/^s3:\/\//, "").split("/");
  return parts.length === 0 || !address.startsWith("s3://") ? "" : `${parts.join("/")}/`;
}
