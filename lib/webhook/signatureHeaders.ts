import { createHmac } from "node:crypto";

/** What is signed, and with what. */
export interface SignatureInput {
  /** Stays the same over all tries of one message. */
  readonly id: string;
  /** Unix time in whole seconds, of this try. */
  readonly timestamp: number;
  readonly body: string;
  /** `whsec_` and base64 each; several while keys are changed over; none leaves the signature out. */
  readonly keys: readonly string[];
}

/**
 * The headers of Standard Webhooks 1.0.0: `webhook-id`, `webhook-timestamp` and, a key at least given,
 * `webhook-signature` with one `v1` signature a key, base64(HMAC-SHA256(key, "id.timestamp.body")).
 * A receiver accepts any of them, so a key is changed by sending both for a while.
 *
 * @throws {TypeError} when id, timestamp or a key is unsound; a key is never repeated in the message
 * @example signatureHeaders({ id: "msg_1", timestamp: 1614265330, body: "{}", keys: [] })["webhook-id"] // "msg_1"
 */
export function signatureHeaders(input: SignatureInput): Record<string, string> {
  const { id, timestamp, body, keys } = input;
  if (!/^[A-Za-z0-9_-]+$/.test(id)) {
    throw new TypeError("signatureHeaders needs an id of letters, digits, - and _");
  }
  if (!Number.isSafeInteger(timestamp) || timestamp < 0) {
    throw new TypeError("signatureHeaders needs a timestamp in whole seconds");
  }
  const headers: Record<string, string> = { "webhook-id": id, "webhook-timestamp": String(timestamp) };
  if (keys.length > 0) {
    const signed = `${id}.${timestamp}.${body}`;
    headers["webhook-signature"] = keys
      .map((key) => `v1,${createHmac("sha256", secretOf(key)).update(signed).digest("base64")}`)
      .join(" ");
  }
  return headers;
}

/** Whether a text is a signing key: `whsec_` (or nothing) and, as the standard asks, 24 to 64 bytes in base64. */
export function isSigningKey(key: string): boolean {
  const encoded = withoutMark(key);
  const { length } = Buffer.from(encoded, "base64");
  return /^[A-Za-z0-9+/]+={0,2}$/.test(encoded) && length >= 24 && length <= 64;
}

function secretOf(key: string): Buffer {
  if (!isSigningKey(key)) {
    throw new TypeError("a signing key needs to be whsec_ and 24 to 64 bytes in base64");
  }
  return Buffer.from(withoutMark(key), "base64");
}

function withoutMark(key: string): string {
  return key.startsWith("whsec_") ? key.slice("whsec_".length) : key;
}
