import { createHash } from "node:crypto";
import { isIP } from "node:net";
import { isLoopbackAddress, isPublicAddress } from "./publicAddress.ts";

/** An address that is not posted to; `message` names the host at most. */
export class AddressError extends Error {
  override readonly name = "AddressError";
}

/**
 * How an address may be named in texts and logs: its host and the first 32 bits of its SHA-256. The path is the
 * secret of most webhooks and is never shown.
 *
 * @example nameAddress("https://hooks.example.com/T0/B0/secret") // "hooks.example.com#" and 8 hex digits
 */
export function nameAddress(address: string): string {
  const hash = createHash("sha256").update(address).digest("hex").slice(0, 8);
  return `${hostOf(address)}#${hash}`;
}

function hostOf(address: string): string {
  try {
    return new URL(address).hostname.slice(0, 100) || "webhook";
  } catch {
    return "webhook";
  }
}

/**
 * The address as a URL that may be posted to as far as the text alone shows (OWASP, Server-Side Request Forgery
 * Prevention): https, no user name or password, no IP address outside the public internet in whatever notation
 * (the URL parser turns decimal, octal, hexadecimal and shortened forms into the common one). What the name
 * resolves to is for `guardedLookup` to judge, at the moment of connecting.
 *
 * With `allowLocal` (tests and demos) loopback is allowed too, and there plain http.
 *
 * @throws {AddressError} when it may not
 */
export function checkAddress(address: string, allowLocal: boolean): URL {
  let url: URL;
  try {
    url = new URL(address);
  } catch {
    throw new AddressError("is not a web address");
  }
  if (url.username !== "" || url.password !== "") throw new AddressError("holds a user name or password");
  const host = url.hostname.replace(/^\[|\]$/g, "");
  const localName = /^localhost\.?$/i.test(host);
  if (url.protocol !== "https:" && !(allowLocal && url.protocol === "http:")) {
    throw new AddressError("is not an https address");
  }
  if (isIP(host) !== 0) {
    const allowed = allowLocal && isLoopbackAddress(host);
    if (!allowed && !isPublicAddress(host))
      throw new AddressError("is not an address of the public internet");
    if (!allowed && url.protocol !== "https:") throw new AddressError("is not an https address");
  } else if (url.protocol !== "https:" && !localName) {
    throw new AddressError("is not an https address");
  } else if (/(^|\.)localhost\.?$/i.test(host) && !allowLocal) {
    throw new AddressError("is not an address of the public internet");
  }
  return url;
}
