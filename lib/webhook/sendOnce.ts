import type { IncomingMessage } from "node:http";
import { request as requestHttp } from "node:http";
import { request as requestHttps } from "node:https";
import type { LookupFunction } from "node:net";
import { AddressError } from "./checkAddress.ts";
import { retryAfter } from "./retryAfter.ts";
import type { PostResult } from "./retryDecision.ts";

/** One post, whole. */
export interface Sending {
  readonly url: URL;
  readonly lookup: LookupFunction;
  readonly headers: Readonly<Record<string, string>>;
  readonly body: string;
  /** For all of it, from looking up the name to the answer's head. */
  readonly timeoutMilliseconds: number;
  readonly clock: () => number;
  /** Certificate authorities to trust instead of the usual ones. */
  readonly authorities?: string | undefined;
}

/** Of an answer's body, which nobody reads, this much and this long is taken in, so that polite receivers finish. */
const drainBytes = 16_384;
const drainMilliseconds = 1_000;

/**
 * Posts once, on a connection of its own, and reports how it ended; never throws. The answer's head decides; its
 * body is read for a moment and then cut, so neither its size nor its slowness matters. Redirects are answers.
 */
export function sendOnce(sending: Sending): Promise<PostResult> {
  const { url, headers, body, timeoutMilliseconds } = sending;
  return new Promise((resolve) => {
    const request = url.protocol === "https:" ? requestHttps : requestHttp;
    const outgoing = request(url, {
      method: "POST",
      agent: false,
      lookup: sending.lookup,
      rejectUnauthorized: true,
      ca: sending.authorities,
      maxHeaderSize: 16_384,
      headers: { ...headers, "content-length": String(Buffer.byteLength(body)), connection: "close" },
    });
    const timer = setTimeout(() => {
      const seconds = Math.max(1, Math.round(timeoutMilliseconds / 1000));
      outgoing.destroy(new Error(`did not answer within ${seconds} s`));
    }, timeoutMilliseconds);
    const settle = (result: PostResult) => {
      clearTimeout(timer);
      resolve(result);
    };
    outgoing.once("response", (answer) => {
      drain(answer);
      settle({
        kind: "answer",
        status: answer.statusCode ?? 0,
        retryAfterMilliseconds: retryAfter(answer.headers["retry-after"], sending.clock()),
      });
    });
    // Listened to for good: a cut connection may report itself again later.
    outgoing.on("error", (error) => settle(faultOf(error)));
    outgoing.once("close", () => settle({ kind: "fault", reason: "closed the connection", lasting: false }));
    outgoing.end(body);
  });
}

function drain(answer: IncomingMessage): void {
  let taken = 0;
  const cut = setTimeout(() => answer.destroy(), drainMilliseconds);
  cut.unref();
  answer.on("data", (piece: Buffer) => {
    taken += piece.length;
    if (taken > drainBytes) answer.destroy();
  });
  answer.on("error", () => undefined);
  answer.once("close", () => clearTimeout(cut));
}

const lastingCodes =
  /^(CERT_|UNABLE_TO_|DEPTH_ZERO_|SELF_SIGNED_|ERR_TLS_CERT|HOSTNAME_MISMATCH|ERR_SSL_WRONG_VERSION)/;

/** Only what is known to hold no part of the address is repeated: codes and our own texts. */
function faultOf(error: NodeJS.ErrnoException): PostResult {
  if (error instanceof AddressError) return { kind: "fault", reason: error.message, lasting: true };
  const { code } = error;
  if (code === undefined) return { kind: "fault", reason: error.message, lasting: false };
  if (lastingCodes.test(code)) {
    return { kind: "fault", reason: `its certificate is not accepted (${code})`, lasting: true };
  }
  const known: Readonly<Record<string, string>> = {
    ENOTFOUND: "its name is not known",
    ECONNREFUSED: "refused the connection",
    ECONNRESET: "closed the connection",
  };
  return { kind: "fault", reason: known[code] ?? `could not be reached (${code})`, lasting: false };
}
