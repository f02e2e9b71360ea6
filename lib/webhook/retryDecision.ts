import { createHash } from "node:crypto";

/** How one post ended: an answer, or none. */
export type PostResult =
  | { readonly kind: "answer"; readonly status: number; readonly retryAfterMilliseconds?: number | undefined }
  /** No answer. `lasting` when another try would end no better: a refused address, a bad certificate. */
  | { readonly kind: "fault"; readonly reason: string; readonly lasting: boolean };

export type RetryDecision =
  | { readonly action: "done" }
  /** `gone`: the receiver says that there is no such webhook (any more). */
  | { readonly action: "stop"; readonly reason: string; readonly gone: boolean }
  | { readonly action: "wait"; readonly milliseconds: number };

/** Posts of one message at most, however much time there is. */
const mostPosts = 8;
const firstWait = 500;
const longestWait = 30_000;
/** Kept back for the last post itself. */
const lastPost = 2_000;
/** Less time than this is not worth another post. */
const leastTime = 200;

/**
 * What to do after the `count`-th post of a message, with `left` milliseconds to go.
 *
 * 2xx is success. 3xx is a failure and never followed; 404 and 410 say that the webhook is gone; other answers below
 * 500 mean that the same body will be refused again. 408, 425, 429, 5xx and broken connections are tried again: after
 * what Retry-After asks, or after half a second, doubled each time, with up to a quarter more that depends on the
 * id (so that many senders do not return in step). Either wait is clamped to the time left.
 */
export function retryDecision(result: PostResult, count: number, left: number, id: string): RetryDecision {
  if (result.kind === "answer") {
    const { status } = result;
    if (status >= 200 && status < 300) return { action: "done" };
    if (status >= 300 && status < 400) return stop(`answered ${status}, a redirect, which is not followed`);
    if (status === 404 || status === 410) return stop(`answered ${status}: there is no such webhook`, true);
    if (status < 500 && ![408, 425, 429].includes(status)) return stop(`answered ${status}`);
  } else if (result.lasting) {
    return stop(result.reason);
  }
  const said = result.kind === "answer" ? `answered ${result.status}` : result.reason;
  if (count >= mostPosts) return stop(`${said}, after ${count} tries`);
  if (left < leastTime) return stop(`${said}, and the time for it is over after ${tries(count)}`);
  const asked = result.kind === "answer" ? result.retryAfterMilliseconds : undefined;
  const wanted = asked ?? Math.min(longestWait, firstWait * 2 ** (count - 1)) * (1 + jitter(id, count) / 4);
  const latest = left - Math.min(lastPost, left / 4);
  return { action: "wait", milliseconds: Math.round(Math.min(wanted, latest)) };
}

function stop(reason: string, gone = false): RetryDecision {
  return { action: "stop", reason, gone };
}

function tries(count: number): string {
  return count === 1 ? "one try" : `${count} tries`;
}

/** A number in [0, 1) that depends on nothing but the message and the try. */
function jitter(id: string, count: number): number {
  return createHash("sha256").update(`${id} ${count}`).digest().readUInt32BE() / 2 ** 32;
}
