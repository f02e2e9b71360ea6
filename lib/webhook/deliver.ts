import { lookup as systemLookup } from "node:dns/promises";
import { AddressError, checkAddress, nameAddress } from "./checkAddress.ts";
import { guardedLookup, type Resolve } from "./guardedLookup.ts";
import { retryDecision } from "./retryDecision.ts";
import { sendOnce } from "./sendOnce.ts";
import { isSigningKey, signatureHeaders } from "./signatureHeaders.ts";

/** One message for one webhook. */
export interface Delivery {
  /** The webhook's secret address; only its host and a hash of it ever appear in an outcome. */
  readonly address: string;
  readonly body: string;
  readonly contentType: string;
  /** Names the message for the receiver, the same over all tries and runs. */
  readonly id: string;
  /** Standard Webhooks keys, `whsec_…`; none sends unsigned. */
  readonly keys: readonly string[];
  /** When to have given up, by `clock`. */
  readonly deadlineMilliseconds: number;
  readonly clock: () => number;
  /** Lets loopback be posted to, and there by http: for tests and demos only. */
  readonly allowLocal?: boolean;
  /** Resolves host names; the system's resolver by default. */
  readonly lookup?: Resolve;
  /** Certificate authorities (PEM) to trust instead of the usual ones. */
  readonly authorities?: string;
}

/** How a delivery ended; `reason` begins with the webhook's host and hash and is fit for people. */
export type DeliveryOutcome =
  | { readonly delivered: true; readonly posts: number; readonly status: number }
  | {
      readonly delivered: false;
      readonly posts: number;
      readonly reason: string;
      /** The receiver says that there is no such webhook (any more): 404 or 410. */
      readonly gone: boolean;
    };

/** The longest one post may take; a webhook that works answers within a second or two. */
const longestPost = 10_000;

/**
 * Posts a message to a webhook until it is taken, refused for good, or the time is over; never throws for what
 * receiver, address or key are like. Every post is signed anew (Standard Webhooks), carries the same id, goes through
 * the address guard, follows no redirect, and takes bounded time and memory. See `retryDecision` for which
 * answers are tried again and when.
 *
 * @throws {TypeError} when the id is unsound
 */
export async function deliver(delivery: Delivery): Promise<DeliveryOutcome> {
  const { address, id, clock, allowLocal = false } = delivery;
  const name = nameAddress(address);
  const failed = (posts: number, reason: string, gone = false): DeliveryOutcome => ({
    delivered: false,
    posts,
    reason: `${name} ${reason}`,
    gone,
  });
  let url: URL;
  try {
    url = checkAddress(address, allowLocal);
  } catch (error) {
    if (error instanceof AddressError) return failed(0, error.message);
    throw error;
  }
  if (!delivery.keys.every(isSigningKey)) return failed(0, "is not posted to: its signing key is unsound");
  const lookup = guardedLookup(delivery.lookup ?? resolveAll, allowLocal, url.protocol === "http:");
  for (let posts = 1; ; posts++) {
    const now = clock();
    const left = delivery.deadlineMilliseconds - now;
    if (left <= 0) return failed(posts - 1, "was not reached in the time there was");
    const result = await sendOnce({
      url,
      lookup,
      body: delivery.body,
      headers: headersOf(delivery, now),
      timeoutMilliseconds: Math.min(longestPost, left),
      clock,
      authorities: delivery.authorities,
    });
    const decision = retryDecision(result, posts, delivery.deadlineMilliseconds - clock(), id);
    if (decision.action === "stop") return failed(posts, decision.reason, decision.gone);
    if (decision.action === "done") {
      return { delivered: true, posts, status: result.kind === "answer" ? result.status : 0 };
    }
    await new Promise((resolve) => setTimeout(resolve, decision.milliseconds));
  }
}

function headersOf({ id, body, keys, contentType }: Delivery, now: number): Record<string, string> {
  const signed = signatureHeaders({ id, timestamp: Math.floor(now / 1000), body, keys });
  return { "content-type": contentType, "user-agent": "ebbwire", ...signed };
}

const resolveAll: Resolve = (host, family) => systemLookup(host, { family, all: true });
