import type { WebhookSettings } from "./settings.ts";

/** Turns `env:NAME` or `secret:NAME` into its value; `undefined` when there is none. */
export type Secrets = (reference: string) => Promise<string | undefined>;

/** A webhook given by a program rather than by settings: the address may stand there itself. */
export type Webhook = Pick<WebhookSettings, "name" | "audience" | "body" | "address" | "signingKey">;

const isReference = (text: string) => /^(env|secret):/.test(text);

/** The value behind a reference, or the text itself. */
export async function resolveReference(
  text: string,
  secrets: Secrets | undefined,
): Promise<string | undefined> {
  return isReference(text) ? secrets?.(text) : text;
}

/**
 * Last part of the names of a webhook's proof and mark. One webhook an audience: the audience alone; several: the
 * webhook's own name is added, so that each has its own proof.
 */
export function postingName(webhook: Webhook, all: readonly Webhook[], part: string): string {
  const shared = all.filter((one) => one.audience === webhook.audience).length > 1;
  return shared ? `${part}-${webhook.name.toLowerCase().replace(/[^a-z0-9]+/g, "-")}` : part;
}
