import { describe, expect, it } from "vitest";
import type { ObjectStore } from "../../lib/store/objectStore.ts";
import { StoreError } from "../../lib/store/objectStore.ts";

const bytes = (text: string) => new TextEncoder().encode(text);
const text = (found: { bytes: Uint8Array } | undefined) =>
  found === undefined ? undefined : new TextDecoder().decode(found.bytes);
const keys = async (store: ObjectStore, prefix: string) => (await store.list(prefix)).map(({ key }) => key);

/** Keys that every store takes and hands back unchanged. */
export const oddKeys = [
  "series/north branch/loans.csv",
  "series/a+b.csv",
  "series/100%25.csv",
  "series/q?x=1&y=2.csv",
  "series/#1;2,3=4.csv",
  "series/'quoted' \"twice\".csv",
  "series/<b>.csv",
  "series/=1+1|cmd.csv",
  "series/café.csv",
  "series/cafe\u0301 decomposed.csv",
  "series/日本語/数.csv",
  "series/🛠️ tools.csv",
  "series/\u{ffff}last.csv",
  "series/\u{10000}later.csv",
  "series/trailing space .csv",
  "series/~tilde/@at/!bang.csv",
  `series/${"x".repeat(251)}.csv`,
];

/** Keys that every store refuses for reading, creating and writing. */
export const refusedKeys = [
  "",
  "/etc/passwd",
  "..",
  "../outside.csv",
  "series/../../outside.csv",
  "series/..",
  "series/./loans.csv",
  "series//loans.csv",
  "series/",
  "series/.hidden",
  ".unfinished/x",
  "series\\..\\..\\outside.csv",
  "series/nul\0.csv",
  "series/line\nbreak.csv",
  "series/\u007f.csv",
  "series/\ud800.csv",
  `series/${"x".repeat(252)}.csv`,
  `${"long/".repeat(210)}x`,
];

/** What every store promises; `fresh` makes a new empty one. */
export function storeContract(name: string, fresh: () => Promise<ObjectStore>): void {
  describe(`the store contract, kept by ${name}`, () => {
    it("an absent object is undefined, for read and for stream", async () => {
      const store = await fresh();
      await store.write("other.json", bytes("{}"));
      expect(await store.read("settings.json")).toBeUndefined();
      expect(await store.stream("settings.json")).toBeUndefined();
      expect(await store.read("deep/er/settings.json")).toBeUndefined();
      expect(await store.read("other.json/below")).toBeUndefined();
    });

    it("the first create wins and a second changes nothing", async () => {
      const store = await fresh();
      expect(await store.create("runs/a/plan.json", bytes("first"))).toBe("created");
      expect(await store.create("runs/a/plan.json", bytes("second"))).toBe("exists");
      expect(await store.create("runs/a/plan.json", bytes("first"))).toBe("exists");
      expect(text(await store.read("runs/a/plan.json"))).toBe("first");
    });

    it("of twenty creates at once exactly one wins, and its bytes stand", async () => {
      const store = await fresh();
      const outcomes = await Promise.all(
        Array.from({ length: 20 }, (_, i) => store.create("runs/a/claim.json", bytes(`writer ${i}`))),
      );
      expect(outcomes.filter((outcome) => outcome === "created")).toHaveLength(1);
      expect(text(await store.read("runs/a/claim.json"))).toBe(`writer ${outcomes.indexOf("created")}`);
    });

    it("of twenty creates of the same bytes exactly one is told that it created", async () => {
      const store = await fresh();
      const outcomes = await Promise.all(
        Array.from({ length: 20 }, () => store.create("runs/a/claim.json", bytes("same"))),
      );
      expect(outcomes.filter((outcome) => outcome === "created")).toHaveLength(1);
    });

    it("create refuses what write put there, and write replaces what create put there", async () => {
      const store = await fresh();
      await store.write("forecasts/a/latest.csv", bytes("one"));
      expect(await store.create("forecasts/a/latest.csv", bytes("two"))).toBe("exists");
      await store.create("b.csv", bytes("one"));
      await store.write("b.csv", bytes("two, longer"));
      await store.write("b.csv", bytes("3"));
      expect(text(await store.read("b.csv"))).toBe("3");
    });

    it("a reader during many writes sees one whole version or another", async () => {
      const store = await fresh();
      const version = (letter: string) => bytes(letter.repeat(200_000));
      await store.write("latest.csv", version("a"));
      let writing = true;
      const writer = (async () => {
        for (const letter of "bcdefghijkl") await store.write("latest.csv", version(letter));
        writing = false;
      })();
      let reads = 0;
      while (writing) {
        const seen = text(await store.read("latest.csv"))!;
        expect(seen === seen[0]!.repeat(200_000)).toBe(true);
        reads++;
      }
      await writer;
      expect(reads).toBeGreaterThan(0);
    });

    it("bytes come back unchanged: none, all values, and megabytes", async () => {
      const store = await fresh();
      const all = Uint8Array.from({ length: 256 }, (_, i) => i);
      const large = Uint8Array.from({ length: 3_000_001 }, (_, i) => (i * 2654435761) >>> 24);
      for (const [key, content] of [
        ["empty.csv", new Uint8Array()],
        ["all.csv", all],
        ["large.csv", large],
      ] as const) {
        await store.create(key, content);
        expect(Buffer.compare((await store.read(key))!.bytes, content)).toBe(0);
        const pieces: Uint8Array[] = [];
        for await (const piece of (await store.stream(key))!) pieces.push(piece);
        expect(Buffer.compare(Buffer.concat(pieces), content)).toBe(0);
      }
      expect((await store.list("")).map(({ size }) => size)).toEqual([256, 0, 3_000_001]);
    });

    it("a stream left early frees what it holds and harms nothing", async () => {
      const store = await fresh();
      await store.write("large.csv", new Uint8Array(3_000_000));
      for (let i = 0; i < 60; i++) {
        for await (const piece of (await store.stream("large.csv"))!) {
          expect(piece.length).toBeGreaterThan(0);
          break;
        }
      }
      expect((await store.read("large.csv"))!.bytes).toHaveLength(3_000_000);
    });

    it("read and list agree on the version, and it changes with the bytes", async () => {
      const store = await fresh();
      await store.write("a.csv", bytes("one"));
      const before = (await store.read("a.csv"))!.version;
      expect((await store.list("a.csv"))[0]!.version).toBe(before);
      expect((await store.read("a.csv"))!.version).toBe(before);
      await store.write("a.csv", bytes("two"));
      const after = (await store.read("a.csv"))!.version;
      expect(after).not.toBe(before);
      expect((await store.list(""))[0]).toEqual({ key: "a.csv", size: 3, version: after });
    });

    it("a listing is ordered by code units and bounded by its prefix alone", async () => {
      const store = await fresh();
      for (const key of [
        "m/loans/2.json",
        "m/loans/10.json",
        "m/loans-extra/1.json",
        "m/Loans2/1.json",
        "z",
      ]) {
        await store.create(key, bytes(key));
      }
      await store.create("m/loans/north/1.json", bytes("nested"));
      expect(await keys(store, "")).toEqual([
        "m/Loans2/1.json",
        "m/loans-extra/1.json",
        "m/loans/10.json",
        "m/loans/2.json",
        "m/loans/north/1.json",
        "z",
      ]);
      expect(await keys(store, "m/loans/")).toEqual([
        "m/loans/10.json",
        "m/loans/2.json",
        "m/loans/north/1.json",
      ]);
      expect(await keys(store, "m/loans/1")).toEqual(["m/loans/10.json"]);
      expect(await keys(store, "m/lo")).toHaveLength(4);
      expect(await keys(store, "m/loans/2.json")).toEqual(["m/loans/2.json"]);
      expect(await keys(store, "m/loans/2.json/")).toEqual([]);
      expect(await keys(store, "nothing/")).toEqual([]);
    });

    it("odd but sound keys keep their spelling", async () => {
      const store = await fresh();
      for (const key of oddKeys) expect(await store.create(key, bytes(key))).toBe("created");
      expect(await keys(store, "series/")).toEqual([...oddKeys].sort());
      for (const key of oddKeys) {
        expect(text(await store.read(key))).toBe(key);
        expect(await keys(store, key)).toEqual([key]);
      }
    });

    it("keys that could leave the store, hide or break it are refused by every action", async () => {
      const store = await fresh();
      await store.write("a.csv", bytes("a"));
      for (const key of refusedKeys) {
        for (const act of [
          () => store.read(key),
          () => store.stream(key),
          () => store.create(key, bytes("x")),
          () => store.write(key, bytes("x")),
        ]) {
          await expect(act(), JSON.stringify(key)).rejects.toThrow(StoreError);
        }
      }
      for (const prefix of ["../", "/", "series/../", "a\0", "./"]) {
        await expect(store.list(prefix), JSON.stringify(prefix)).rejects.toThrow(StoreError);
      }
      expect(await keys(store, "")).toEqual(["a.csv"]);
    });

    it("a fault names the store, the action and the key", async () => {
      const store = await fresh();
      const fault = await store.create("../x", bytes("")).catch((error: unknown) => error as StoreError);
      expect(fault).toMatchObject({ name: "StoreError", action: "create", key: "../x" });
      expect((fault as StoreError).message).toBe(
        `could not create "../x" in ${store.address}: a part begins with a dot`,
      );
    });
  });
}
