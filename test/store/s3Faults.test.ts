import { inspect } from "node:util";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { ObjectStore } from "../../lib/store/objectStore.ts";
import { StoreError } from "../../lib/store/objectStore.ts";
import { S3Store } from "../../lib/store/s3Store.ts";
import { cephBucket, gateway, hasGateway } from "../support/cephStore.ts";
import {
  type Fault,
  type FaultProxy,
  faultProxy,
  faults,
  randomFaults,
  seeded,
} from "../support/faultProxy.ts";

const sequences = 240;
const operationsEach = 8;
const shareOfFaults = 0.25;
const names = ["a.json", "b.csv", "deep/c.json"];

describe.skipIf(!hasGateway)("a bucket behind a faulty network", () => {
  let proxy: FaultProxy;
  let bucket: string;
  let direct: string;

  beforeAll(async () => {
    direct = (await gateway()).endpoint;
    proxy = await faultProxy(direct, 5_000);
    bucket = await cephBucket();
  });
  afterAll(() => proxy.stop());

  function stores(prefix: string): { faulty: ObjectStore; sound: ObjectStore } {
    return {
      faulty: new S3Store(bucket, prefix, { endpoint: proxy.endpoint, idleMilliseconds: 1_000 }),
      sound: new S3Store(bucket, prefix, { endpoint: direct }),
    };
  }

  /** The next requests meet these faults, one each; the later ones none. */
  function meet(...coming: (Fault | undefined)[]): void {
    proxy.decide = () => coming.shift();
  }

  it.each(faults)("create is told that it created when the first answer met %s", async (fault) => {
    const { faulty, sound } = stores(`create-${fault}`);
    meet(fault);
    expect(await faulty.create("claim.json", Buffer.from("ours"))).toBe("created");
    expect(Buffer.from((await sound.read("claim.json"))!.bytes).toString()).toBe("ours");
  });

  it.each(faults)(
    "create finds another's object, even of the same bytes, when the first answer met %s",
    async (fault) => {
      const { faulty, sound } = stores(`exists-${fault}`);
      await sound.create("claim.json", Buffer.from("same"));
      meet(fault);
      expect(await faulty.create("claim.json", Buffer.from("same"))).toBe("exists");
    },
  );

  it.each(faults)(
    "read and stream give the whole object when answers met %s, three times over",
    async (fault) => {
      const { faulty, sound } = stores(`read-${fault}`);
      const content = Buffer.from(Uint8Array.from({ length: 400_000 }, (_, i) => (i * 2654435761) >>> 24));
      await sound.write("large.csv", content);
      meet(fault, fault, fault);
      expect(content.equals((await faulty.read("large.csv"))!.bytes)).toBe(true);
      meet(fault, fault);
      const pieces: Uint8Array[] = [];
      for await (const piece of (await faulty.stream("large.csv"))!) pieces.push(piece);
      expect(content.equals(Buffer.concat(pieces))).toBe(true);
    },
  );

  it("a stream never mixes two versions of an object", async () => {
    const { faulty, sound } = stores("mixed");
    await sound.write("large.csv", Buffer.alloc(400_000, "a"));
    meet("truncate");
    const stream = (await faulty.stream("large.csv"))!;
    await sound.write("large.csv", Buffer.alloc(400_000, "b"));
    const reading = (async () => {
      for await (const piece of stream) expect(piece.every((byte) => byte === 97)).toBe(true);
    })();
    await expect(reading).rejects.toThrow(/could not read "large.csv" in s3:.*replaced while it was read/);
  });

  it("gives up with a StoreError that names the bucket and no secret when nothing gets through", async () => {
    const { faulty } = stores("down");
    for (const fault of ["reset-before", "error", "slow-down"] as const) {
      proxy.decide = () => fault;
      const bytes = Buffer.from("a");
      const acts = [
        faulty.read("a.json"),
        faulty.create("a.json", bytes),
        faulty.write("a.json", bytes),
        faulty.list(""),
      ];
      for (const ended of await Promise.allSettled<unknown>(acts)) {
        const error = ended.status === "rejected" ? ended.reason : undefined;
        expect(error).toBeInstanceOf(StoreError);
        expect((error as StoreError).message).toContain(`s3://${bucket}/down`);
        const { accessKey, secretKey } = await gateway();
        for (const secret of [accessKey, secretKey, "Signature", "Authorization"]) {
          expect(inspect(error, { depth: 9, showHidden: true })).not.toContain(secret);
        }
      }
    }
  });

  it(`${sequences} seeded sequences of operations never lie: each tells what happened or fails cleanly`, async () => {
    proxy.decide = randomFaults(20261201, shareOfFaults);
    const before = { ...proxy.counts };
    const outcomes = { done: 0, failed: 0 };
    for (let first = 0; first < sequences; first += 48) {
      const group = Array.from({ length: 48 }, (_, i) => first + i);
      await Promise.all(group.map((seed) => runSequence(seed, stores(`sequence-${seed}`), outcomes)));
    }
    const met = faults.map((fault) => proxy.counts[fault] - before[fault]);
    console.info(
      `${outcomes.done} operations done, ${outcomes.failed} failed cleanly; faults met: ${faults.map((fault, i) => `${fault} ${met[i]}`).join(", ")}`,
    );
    expect(outcomes.done + outcomes.failed).toBe(sequences * operationsEach);
    // The network is faulty, not down: nearly all gets through.
    expect(outcomes.failed).toBeLessThan(outcomes.done / 10);
    for (const count of met) expect(count).toBeGreaterThan(20);
  }, 300_000);

  /** Runs random operations against a plain record of what must then stand in the store. */
  async function runSequence(
    seed: number,
    { faulty, sound }: ReturnType<typeof stores>,
    outcomes: { done: number; failed: number },
  ): Promise<void> {
    const next = seeded(seed);
    const standing = new Map<string, string>();
    const sorted = () => [...standing.keys()].sort();
    for (let step = 0; step < operationsEach; step++) {
      const key = names[Math.floor(next() * names.length)]!;
      // Often the same bytes, which is when a lost answer is hardest to tell from another's object.
      const content = next() < 0.5 ? "same" : `seed ${seed} step ${step} `.repeat(50);
      const kind = Math.floor(next() * 5);
      try {
        if (kind <= 1) {
          const outcome = await faulty.create(key, Buffer.from(content));
          expect(outcome, `seed ${seed} step ${step}`).toBe(standing.has(key) ? "exists" : "created");
          if (outcome === "created") standing.set(key, content);
        } else if (kind === 2) {
          await faulty.write(key, Buffer.from(content));
          standing.set(key, content);
        } else if (kind === 3) {
          const found = await faulty.read(key);
          expect(found && Buffer.from(found.bytes).toString()).toBe(standing.get(key));
        } else {
          expect((await faulty.list("")).map((entry) => entry.key)).toEqual(sorted());
        }
        outcomes.done++;
      } catch (error) {
        if (!(error instanceof StoreError)) throw error;
        outcomes.failed++;
        // A failed change happened as a whole or not at all.
        const found = await sound.read(key);
        const text = found && Buffer.from(found.bytes).toString();
        const possible =
          kind === 2
            ? [standing.get(key), content]
            : kind <= 1
              ? [standing.get(key) ?? content, standing.get(key)]
              : [standing.get(key)];
        expect(possible).toContain(text);
        if (text !== undefined) standing.set(key, text);
      }
    }
    expect((await sound.list("")).map((entry) => entry.key)).toEqual(sorted());
    for (const [key, content] of standing) {
      expect(Buffer.from((await sound.read(key))!.bytes).toString()).toBe(content);
    }
  }
});
