import type { Node } from "constructs";
import { type CheckedOptions, checkOptions } from "./options.ts";

/** Context values of this project begin with this, so that a misspelt one can be told from another tool's. */
const prefix = "ebbwire:";

/**
 * Reads the choices of a deployment from CDK context: `-c ebbwire:timeZone=Europe/Lisbon`, or under `context`
 * in cdk.json.
 *
 * @throws {ChoiceError} naming every context value that is unknown or cannot be used
 */
export function optionsFromContext(node: Node): CheckedOptions {
  const context = Object.entries(node.getAllContext() as Record<string, unknown>);
  const own = context.filter(([name]) => name.startsWith(prefix));
  return checkOptions(
    Object.fromEntries(own.map(([name, value]) => [name.slice(prefix.length), value])),
    (name) => prefix + name,
  );
}
