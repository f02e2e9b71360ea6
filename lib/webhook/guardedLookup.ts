import type { LookupAddress, LookupOptions } from "node:dns";
import type { LookupFunction } from "node:net";
import { AddressError } from "./checkAddress.ts";
import { isLoopbackAddress, isPublicAddress } from "./publicAddress.ts";

/** Resolves a host name to all its addresses; `dns.promises.lookup` with `all` by default. */
export type Resolve = (host: string, family: 0 | 4 | 6) => Promise<readonly LookupAddress[]>;

/**
 * A `lookup` for `node:https` that hands the socket only addresses it has judged itself, so that a name cannot
 * resolve to one address for the check and to another for the connection. One address of the name that is not of
 * the public internet condemns them all. `isIP` hosts never come here (Node does not look them up).
 */
export function guardedLookup(resolve: Resolve, allowLocal: boolean, localOnly: boolean): LookupFunction {
  const allowed = (address: string) =>
    (!localOnly && isPublicAddress(address)) || (allowLocal && isLoopbackAddress(address));
  return (host, options, callback) => {
    resolve(host, familyOf(options)).then(
      (found) => {
        if (found.length === 0) return callback(new Error("the name has no address"), []);
        if (!found.every(({ address }) => allowed(address))) {
          return callback(new AddressError("resolves to an address outside the public internet"), []);
        }
        return options.all ? callback(null, [...found]) : callback(null, found[0]!.address, found[0]!.family);
      },
      (error: NodeJS.ErrnoException) => callback(error, []),
    );
  };
}

function familyOf({ family }: LookupOptions): 0 | 4 | 6 {
  return family === 4 || family === "IPv4" ? 4 : family === 6 || family === "IPv6" ? 6 : 0;
}
