import { join, sep } from "node:path";
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { byKey, keyFault, prefixFault } from "../../lib/store/key.ts";

// Parts that path tricks are made of, beside any text at all.
const part = fc.oneof(
  fc.constantFrom(
    "..",
    ".",
    "",
    "a",
    "series",
    "...",
    "..\\",
    "~",
    "C:",
    "%2e%2e",
    "\0",
    " ",
    "\u202e",
    "\ud800",
  ),
  fc.string({ unit: "binary", maxLength: 12 }),
);
const key = fc.array(part, { maxLength: 8 }).map((parts) => parts.join("/"));

describe("keyFault", () => {
  it("lets no key through that leads out of the store or to a hidden file", () => {
    let sound = 0;
    fc.assert(
      fc.property(key, (text) => {
        if (keyFault(text) !== undefined) return;
        sound++;
        const path = join("/srv/store", text);
        expect(path).toBe(`/srv/store${sep}${text}`);
        expect(text.split("/").every((name) => name !== "" && !name.startsWith("."))).toBe(true);
      }),
      { numRuns: 3_000, seed: 1 },
    );
    expect(sound).toBeGreaterThan(100);
  });

  it("holds to the limits of S3 keys and of file names, in bytes", () => {
    expect(keyFault("x".repeat(255))).toBeUndefined();
    expect(keyFault("x".repeat(256))).toBe("a part is longer than 255 bytes");
    expect(keyFault("é".repeat(128))).toBe("a part is longer than 255 bytes");
    const long = Array(5).fill("x".repeat(200)).join("/");
    expect(keyFault(`${long}/${"x".repeat(1024 - 1005)}`)).toBeUndefined();
    expect(keyFault(`${long}/${"x".repeat(1025 - 1005)}`)).toBe("the key is longer than 1024 bytes");
  });

  it("takes as a prefix what begins a sound key", () => {
    for (const prefix of ["", "s", "series/", "series/lo", "a/b/"])
      expect(prefixFault(prefix)).toBeUndefined();
    for (const prefix of ["/", "../", "a//", ".", "a/.", "a\0"]) expect(prefixFault(prefix)).toBeDefined();
  });
});

describe("byKey", () => {
  it("orders as < does on strings, whatever the locale", () => {
    fc.assert(
      fc.property(fc.array(fc.string({ unit: "binary" })), (keys) => {
        const sorted = keys.map((one) => ({ key: one })).sort(byKey);
        for (let i = 1; i < sorted.length; i++) expect(sorted[i - 1]!.key <= sorted[i]!.key).toBe(true);
      }),
      { numRuns: 200, seed: 1 },
    );
  });
});
