import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { StoreError } from "../../lib/store/objectStore.ts";
import { S3Store } from "../../lib/store/s3Store.ts";
import { leaks } from "../support/canary.ts";
import { cephBucket, gateway, hasGateway } from "../support/cephStore.ts";
import { type FaultProxy, faultProxy, faults, randomFaults } from "../support/faultProxy.ts";
import { inTurns } from "../support/inTurns.ts";
import { fillStore } from "../support/jobStores.ts";
import { receiver } from "../support/receiver.ts";
import { documents, hookOf, tinyRun } from "../support/tinyRun.ts";
import { tinyTables } from "../support/tinyTables.ts";

/** Most runs meet a bad network, the last ones one so bad that many of them fail. */
const runs = 200;
const badRuns = 40;
const shares = { bad: 0.1, terrible: 0.55 };

describe.skipIf(!hasGateway)("runs behind a faulty network", () => {
  let proxy: FaultProxy;
  let bucket: string;
  let direct: string;
  beforeAll(async () => {
    direct = (await gateway()).endpoint;
    proxy = await faultProxy(direct, 5_000);
    bucket = await cephBucket();
  });
  afterAll(() => proxy.stop());

  it(`${runs + badRuns} runs finish or fail cleanly, and a retry of those that failed completes them with one post`, async () => {
    const hook = await receiver();
    const at = (prefix: string, endpoint: string) =>
      new S3Store(bucket, prefix, { endpoint, idleMilliseconds: 1_000 });
    const undisturbedStore = at("undisturbed", direct);
    await fillStore(undisturbedStore, tinyTables());
    await tinyRun(undisturbedStore, hookOf(hook.port, "undisturbed"));
    const undisturbed = await documents(undisturbedStore);

    const { accessKey, secretKey } = await gateway();
    const outcomes = { finished: 0, failed: 0, doubled: 0 };
    const oneRun = async (number: number) => {
      const mark = `network-${number}`;
      const sound = at(mark, direct);
      await fillStore(sound, tinyTables());
      const error: unknown = await tinyRun(at(mark, proxy.endpoint), hookOf(hook.port, mark)).then(
        () => undefined,
        (found: unknown) => found,
      );
      if (error === undefined) outcomes.finished++;
      else {
        outcomes.failed++;
        expect(error, mark).toBeInstanceOf(StoreError);
        expect(leaks(String(error), accessKey, secretKey), mark).toEqual([]);
        await tinyRun(sound, hookOf(hook.port, mark), 3_600_000);
      }
      expect(await documents(sound), mark).toEqual(undisturbed);
      const posts = hook.received.filter(({ path }) => path.endsWith(`?run=${mark}`));
      expect(new Set(posts.map(({ headers }) => headers["webhook-id"])).size, mark).toBe(1);
      // Twice only when the store was lost between the webhook's answer and the proof.
      expect(posts.length, mark).toBeLessThanOrEqual(error === undefined ? 1 : 2);
      outcomes.doubled += posts.length - 1;
    };
    const numbers = Array.from({ length: runs + badRuns }, (_, i) => i);
    proxy.decide = randomFaults(1, shares.bad);
    await inTurns(numbers.slice(0, runs), 12, oneRun);
    proxy.decide = randomFaults(2, shares.terrible);
    await inTurns(numbers.slice(runs), 12, oneRun);
    console.info(
      `${outcomes.finished} runs finished, ${outcomes.failed} failed cleanly and were completed, ${outcomes.doubled} posts doubled; faults met: ${faults.map((fault) => `${fault} ${proxy.counts[fault]}`).join(", ")}`,
    );
    expect(outcomes.finished + outcomes.failed).toBe(runs + badRuns);
    expect(outcomes.failed).toBeGreaterThan(0);
    for (const fault of faults) expect(proxy.counts[fault], fault).toBeGreaterThan(20);
  }, 900_000);
});
