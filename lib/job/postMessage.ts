import { createHash } from "node:crypto";
import type { ObjectStore } from "../store/objectStore.ts";
import { composeBody } from "../webhook/composeBody.ts";
import { deliver } from "../webhook/deliver.ts";
import { deliverOnce } from "./deliverOnce.ts";
import { runPrefix } from "./keys.ts";
import type { MessageDocument } from "./messages.ts";
import type { DeliveryRecord } from "./summary.ts";
import { postingName, resolveReference, type Secrets, type Webhook } from "./webhooks.ts";

/** What every post of a run shares. */
export interface PostingContext {
  readonly store: ObjectStore;
  readonly webhooks: readonly Webhook[];
  readonly secrets: Secrets | undefined;
  readonly allowLocal: boolean;
  readonly quietWhenSteady: boolean;
  readonly owner: string;
  readonly clock: () => number;
  readonly sleep: (milliseconds: number) => Promise<void>;
  /** The longest one post may take, retries included. */
  readonly postMilliseconds: () => number;
}

/** The same note to the same webhook always carries the same id, so that a receiver can drop a second copy. */
function messageId(asOf: string, name: string, webhook: string): string {
  return `msg_${createHash("sha256").update(`${asOf}\n${name}\n${webhook}`).digest("hex").slice(0, 24)}`;
}

/** Posts one message to one webhook, at most once over all tries of all runs. */
export async function postMessage(
  context: PostingContext,
  message: MessageDocument,
  part: string,
  webhook: Webhook,
): Promise<DeliveryRecord> {
  const record = { webhook: webhook.name, audience: message.audience, asOf: message.asOf };
  if (context.quietWhenSteady && !message.hasNews && message.audience !== "operations")
    return { ...record, status: "nothing-to-say" };
  const address = await resolveReference(webhook.address, context.secrets);
  if (!address?.startsWith("http"))
    return {
      ...record,
      status: "not-configured",
      reason: `no web address stands behind ${referenceName(webhook.address)}`,
    };
  const key = webhook.signingKey ? await resolveReference(webhook.signingKey, context.secrets) : undefined;
  if (webhook.signingKey && !key)
    return {
      ...record,
      status: "not-configured",
      reason: `no key stands behind ${referenceName(webhook.signingKey)}`,
    };
  const name = postingName(webhook, context.webhooks, part);
  const id = messageId(message.asOf, name, webhook.name);
  const postMilliseconds = context.postMilliseconds();
  const outcome = await deliverOnce({
    store: context.store,
    prefix: runPrefix(message.asOf),
    name,
    document: { schema: 1, id, ...record },
    owner: context.owner,
    leaseMilliseconds: postMilliseconds + 5_000,
    clock: context.clock,
    sleep: context.sleep,
    post: async () => {
      const { body, contentType } = composeBody(message.message, webhook.body);
      const result = await deliver({
        address,
        body,
        contentType,
        id,
        keys: key ? key.split(/\s+/) : [],
        deadlineMilliseconds: context.clock() + postMilliseconds,
        clock: context.clock,
        allowLocal: context.allowLocal,
      });
      return result.delivered ? undefined : result.reason;
    },
  });
  return { ...record, ...outcome };
}

/** References may be told; an address given by a program may not. */
const referenceName = (text: string) => (/^(env|secret):/.test(text) ? text : "the address given");
