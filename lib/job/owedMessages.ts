import type { ObjectStore } from "../store/objectStore.ts";
import type { ClaimDocument } from "./deliverOnce.ts";
import { readDocument } from "./documents.ts";
import { type MessageDocument, partName, readMessageParts } from "./messages.ts";
import { postingName, type Webhook } from "./webhooks.ts";

/** A message an earlier run could not deliver. */
export interface OwedMessage {
  readonly message: MessageDocument;
  readonly part: string;
  readonly webhook: Webhook;
}

/** At most this many old notes go out with a new one: a receiver back after months is not flooded. */
const mostOwed = 5;

/** Reads the messages behind claims without proof, oldest first; those whose webhook is gone from settings are let be. */
export async function readOwedMessages(
  store: ObjectStore,
  marks: readonly string[],
  webhooks: readonly Webhook[],
): Promise<OwedMessage[]> {
  const owed: OwedMessage[] = [];
  for (const key of [...marks].sort()) {
    const mark = await readDocument<ClaimDocument>(store, key);
    const webhook = webhooks.find((one) => one.name === mark?.webhook);
    if (!mark || !webhook) continue;
    const parts = await readMessageParts(store, mark.asOf, mark.audience);
    for (const [index, message] of parts.entries()) {
      const part = partName(mark.audience, index + 1);
      if (key.endsWith(`/delivering-${postingName(webhook, webhooks, part)}.json`))
        owed.push({ message, part, webhook });
    }
  }
  return owed.slice(-mostOwed);
}
