import type { Secrets } from "../../lib/job/webhooks.ts";
import type { Log } from "./log.ts";

/** Reads the text of the deployment's one secret. */
export type ReadSecret = () => Promise<string | undefined>;

/**
 * Looks up `secret:NAME` in the deployment's secret, a JSON object of names to values, and `env:NAME` in the
 * environment (but none of Lambda's own `AWS_…`).
 *
 * The secret is read once an invocation, and only when a webhook asks for it. One that still holds the text it was
 * made with means that nothing is delivered yet: said in the log, never a failure. Being refused the secret, or
 * Secrets Manager being away, does throw: the run is then tried again and the message is not lost.
 */
export function secretsOf(
  read: ReadSecret,
  environment: Readonly<Record<string, string | undefined>>,
  log: Log,
): Secrets {
  let values: Promise<ReadonlyMap<string, string>> | undefined;
  return async (reference) => {
    const name = reference.slice(reference.indexOf(":") + 1);
    if (reference.startsWith("env:")) return name.startsWith("AWS_") ? undefined : environment[name];
    if (!reference.startsWith("secret:")) return undefined;
    values ??= read().then((text) => valuesOf(text, log));
    const value = (await values).get(name);
    if (value === undefined)
      log.warn("the secret has no value of this name: its webhook gets nothing", { name });
    return value;
  };
}

function valuesOf(text: string | undefined, log: Log): ReadonlyMap<string, string> {
  let parsed: unknown;
  try {
    parsed = JSON.parse(text ?? "");
  } catch {
    parsed = undefined;
  }
  if (typeof parsed !== "object" || parsed === null || Array.isArray(parsed)) {
    log.warn("the secret holds no JSON object of names to values yet: nothing is delivered until it does");
    return new Map();
  }
  const texts = Object.entries(parsed).filter(
    (entry): entry is [string, string] => typeof entry[1] === "string",
  );
  return new Map(texts.map(([name, value]) => [name, value.trim()]));
}
