import { describe, expect, it } from "vitest";
import { isLoopbackAddress, isPublicAddress } from "../../lib/webhook/publicAddress.ts";

// First and last address of every block that is not globally reachable, and its public neighbours, from IANA's special-
// purpose address registries (RFC 6890, 8190 and updates; from memory), with 0 where the neighbour is special too.
const blocks: readonly (readonly [string, string, string | 0, string | 0])[] = [
  ["0.0.0.0", "0.255.255.255", 0, "1.0.0.0"],
  ["10.0.0.0", "10.255.255.255", "9.255.255.255", "11.0.0.0"],
  ["100.64.0.0", "100.127.255.255", "100.63.255.255", "100.128.0.0"],
  ["127.0.0.0", "127.255.255.255", "126.255.255.255", "128.0.0.0"],
  ["168.63.129.16", "168.63.129.16", "168.63.129.15", "168.63.129.17"],
  ["169.254.0.0", "169.254.255.255", "169.253.255.255", "169.255.0.0"],
  ["172.16.0.0", "172.31.255.255", "172.15.255.255", "172.32.0.0"],
  ["192.0.0.0", "192.0.0.255", "191.255.255.255", "192.0.1.0"],
  ["192.0.2.0", "192.0.2.255", "192.0.1.255", "192.0.3.0"],
  ["192.88.99.0", "192.88.99.255", "192.88.98.255", "192.88.100.0"],
  ["192.168.0.0", "192.168.255.255", "192.167.255.255", "192.169.0.0"],
  ["198.18.0.0", "198.19.255.255", "198.17.255.255", "198.20.0.0"],
  ["198.51.100.0", "198.51.100.255", "198.51.99.255", "198.51.101.0"],
  ["203.0.113.0", "203.0.113.255", "203.0.112.255", "203.0.114.0"],
  ["224.0.0.0", "239.255.255.255", "223.255.255.255", 0],
  ["240.0.0.0", "255.255.255.255", 0, 0],
  ["::", "::1", 0, 0],
  ["::ffff:0:0", "::ffff:ffff:ffff", 0, 0],
  ["64:ff9b:1::", "64:ff9b:1:ffff:ffff:ffff:ffff:ffff", 0, 0],
  ["100::", "100::ffff:ffff:ffff:ffff", 0, 0],
  ["2001::", "2001:1ff:ffff:ffff:ffff:ffff:ffff:ffff", "2000:ffff::", "2001:200::"],
  ["2001:db8::", "2001:db8:ffff:ffff:ffff:ffff:ffff:ffff", "2001:db7:ffff::", "2001:db9::"],
  ["2002::", "2002:ffff:ffff:ffff:ffff:ffff:ffff:ffff", "2001:ffff::", "2003::"],
  ["3fff::", "3fff:fff:ffff:ffff:ffff:ffff:ffff:ffff", "3ffe:ffff::", "3fff:1000::"],
  ["5f00::", "5f00:ffff:ffff:ffff:ffff:ffff:ffff:ffff", 0, 0],
  ["fc00::", "fdff:ffff:ffff:ffff:ffff:ffff:ffff:ffff", 0, 0],
  ["fe80::", "febf:ffff:ffff:ffff:ffff:ffff:ffff:ffff", 0, 0],
  ["fec0::", "feff:ffff:ffff:ffff:ffff:ffff:ffff:ffff", 0, 0],
  ["ff00::", "ffff:ffff:ffff:ffff:ffff:ffff:ffff:ffff", 0, 0],
];

describe("isPublicAddress", () => {
  it.each(blocks)("keeps out %s to %s, and nothing beyond", (first, last, before, after) => {
    for (const address of [first, last]) expect(isPublicAddress(address), address).toBe(false);
    for (const address of [before, after])
      if (address !== 0) expect(isPublicAddress(address), address).toBe(true);
  });

  it("judges an address behind a translator (64:ff9b::/96) by the IPv4 address it stands for", () => {
    for (const [first] of blocks) {
      if (first.includes(":")) continue;
      expect(isPublicAddress(`64:ff9b::${first}`), first).toBe(false);
    }
    for (const address of ["64:ff9b::8.8.8.8", "64:ff9b::808:808", "64:ff9b::1.0.0.1"]) {
      expect(isPublicAddress(address), address).toBe(true);
    }
  });

  it("takes nothing for public that is no address", () => {
    for (const text of [
      "",
      "example.com",
      "8.8.8",
      "8.8.8.8/32",
      "08.8.8.8",
      "2606:4700::1111%eth0",
      "fe80::1%1",
    ]) {
      expect(isPublicAddress(text), text).toBe(false);
    }
  });
});

describe("isLoopbackAddress", () => {
  it("knows 127.0.0.0/8 and ::1, and no disguise of them", () => {
    for (const address of ["127.0.0.1", "127.255.255.254", "::1"])
      expect(isLoopbackAddress(address), address).toBe(true);
    for (const address of [
      "::ffff:127.0.0.1",
      "::ffff:7f00:1",
      "64:ff9b::7f00:1",
      "128.0.0.1",
      "localhost",
      "::",
    ]) {
      expect(isLoopbackAddress(address), address).toBe(false);
    }
  });
});
