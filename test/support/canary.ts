import { createHash } from "node:crypto";

/** Secrets that a test plants and then looks for in everything that was written, printed or posted. */
export const canary = {
  path: "/hooks/T7CANARY/B7CANARY/kH3vZq9sWm2xR8pLcanary",
  signingKey: `whsec_${createHash("sha256").update("canary signing key").digest("base64")}`,
};

const pathPart = "kH3vZq9sWm2xR8pLcanary";
const keyBytes = Buffer.from(canary.signingKey.slice("whsec_".length), "base64");

/** Each secret in the spellings it could leak in. */
const spellings: readonly string[] = [
  pathPart,
  "T7CANARY",
  "B7CANARY",
  encodeURIComponent(canary.path),
  Buffer.from(pathPart).toString("hex"),
  Buffer.from(pathPart).toString("base64").slice(0, -4),
  canary.signingKey.slice("whsec_".length),
  encodeURIComponent(canary.signingKey.slice("whsec_".length)),
  keyBytes.toString("hex"),
  keyBytes.toString("base64url"),
  keyBytes.toString("latin1"),
];

/** The spellings of planted secrets, and of `more`, found in some text or bytes; empty when nothing leaked. */
export function leaks(written: string | Uint8Array, ...more: readonly string[]): string[] {
  const text = typeof written === "string" ? written : Buffer.from(written).toString("latin1");
  return [...spellings, ...more].filter((secret) => text.includes(secret));
}
