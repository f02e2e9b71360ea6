import { createHash } from "node:crypto";
import type { WebhookSettings } from "./settings.ts";

/** Turns `env:NAME` or `secret:NAME` into its value; `undefined` when there is none. */
export type Secrets = (reference: string) => Promise<string | undefined>;

/** A webhook given by a program rather than by settings: the address may stand there itself. */
export type Webhook = Pick<WebhookSettings, "name" | "audience" | "body" | "address" | "signingKey">;

/** The body is `text` and the name the audience unless said. */
export type WebhookInput = Pick<Webhook, "audience" | "address"> & Partial<Webhook>;

export const completeWebhook = (webhook: WebhookInput): Webhook => ({
  ...webhook,
  name: webhook.name ?? webhook.audience,
  body: webhook.body ?? "text",
});

const isReference = (text: string) => /^(env|secret):/.test(text);

/** The value behind a reference, or the text itself. */
export async function resolveReference(
  text: string,
  secrets: Secrets | undefined,
): Promise<string | undefined> {
  const value = isReference(text) ? await secrets?.(text) : text;
  return value?.trim();
}

/**
 * Last part of the names of a webhook's claims, proof and marks: the audience alone for its first webhook; for each
 * further one its own name is added, so that adding one later leaves the first one's proofs in place.
 */
export function postingName(webhook: Webhook, all: readonly Webhook[], part: string): string {
  const first = all.find((one) => one.audience === webhook.audience);
  if (first === undefined || first.name === webhook.name) return part;
  const slug = webhook.name.toLowerCase().replace(/[^a-z0-9]+/g, "-");
  return `${part}-${slug}-${createHash("sha256").update(webhook.name).digest("hex").slice(0, 8)}`;
}
