import { BlockList, isIP } from "node:net";

// Special-purpose registries of IANA (RFC 6890 and its updates): all that is not globally reachable, and what stands
// for another address. 168.63.129.16 is a cloud's own service address inside its machines.
const special: readonly (readonly [string, number, "ipv4" | "ipv6"])[] = [
  ["0.0.0.0", 8, "ipv4"],
  ["10.0.0.0", 8, "ipv4"],
  ["100.64.0.0", 10, "ipv4"],
  ["127.0.0.0", 8, "ipv4"],
  ["168.63.129.16", 32, "ipv4"],
  ["169.254.0.0", 16, "ipv4"],
  ["172.16.0.0", 12, "ipv4"],
  ["192.0.0.0", 24, "ipv4"],
  ["192.0.2.0", 24, "ipv4"],
  ["192.88.99.0", 24, "ipv4"],
  ["192.168.0.0", 16, "ipv4"],
  ["198.18.0.0", 15, "ipv4"],
  ["198.51.100.0", 24, "ipv4"],
  ["203.0.113.0", 24, "ipv4"],
  ["224.0.0.0", 3, "ipv4"],
  ["2001::", 23, "ipv6"],
  ["2001:db8::", 32, "ipv6"],
  ["2002::", 16, "ipv6"],
  ["3fff::", 20, "ipv6"],
];
const blocked = new BlockList();
for (const [net, prefix, family] of special) blocked.addSubnet(net, prefix, family);

/** Global unicast, RFC 4291: loopback, mapped, unique-local, link-local, multicast lie outside. */
const globalUnicast = new BlockList();
globalUnicast.addSubnet("2000::", 3, "ipv6");
/** RFC 6052: an IPv4 address in its last 32 bits, reached through a translator. */
const translated = new BlockList();
translated.addSubnet("64:ff9b::", 96, "ipv6");

const loopback = new BlockList();
loopback.addSubnet("127.0.0.0", 8, "ipv4");

/**
 * Whether an IP address is one of the public internet. Anything else (loopback, private, link-local with the
 * clouds' metadata services, shared, documentation, multicast, mapped, tunnelled) is not, and neither is what is
 * no IP address at all.
 *
 * @example isPublicAddress("169.254.169.254") // false
 */
export function isPublicAddress(address: string): boolean {
  const family = isIP(address);
  if (family === 4) return !blocked.check(address, "ipv4");
  if (family !== 6 || address.includes("%")) return false;
  if (translated.check(address, "ipv6")) return isPublicAddress(lastFourBytes(address));
  return globalUnicast.check(address, "ipv6") && !blocked.check(address, "ipv6");
}

/** Whether an IP address is this machine's own loopback; mapped and other disguised forms are not. */
export function isLoopbackAddress(address: string): boolean {
  return address === "::1" || (isIP(address) === 4 && loopback.check(address, "ipv4"));
}

/** The IPv4 address in the last 32 bits of an IPv6 address. */
function lastFourBytes(address: string): string {
  // The URL parser writes every IPv6 address in its one shortest form, without dots.
  const groups = new URL(`http://[${address}]/`).hostname.slice(1, -1).split(":");
  const bits = (text: string | undefined) => Number.parseInt(text || "0", 16);
  const [high, low] = [bits(groups.at(-2)), bits(groups.at(-1))];
  return [high >> 8, high & 255, low >> 8, low & 255].join(".");
}
