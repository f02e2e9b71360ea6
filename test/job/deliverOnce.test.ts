import { describe, expect, it } from "vitest";
import { deliverOnce, type Posting } from "../../lib/job/deliverOnce.ts";
import { MemoryStore } from "../support/memoryStore.ts";

/** A posting on a shared store whose clock moves only while a sender sleeps. */
function posting(store: MemoryStore, owner: string, time: { now: number }, post: Posting["post"]): Posting {
  return {
    store,
    prefix: "runs/r/",
    name: "business",
    document: {
      schema: 1,
      id: "msg_1",
      asOf: "2026-11-30T06:00:00Z",
      webhook: "counter",
      audience: "business",
    },
    owner,
    leaseMilliseconds: 10_000,
    clock: () => time.now,
    sleep: async (milliseconds) => {
      time.now += milliseconds;
      await new Promise((resolve) => setImmediate(resolve));
    },
    post,
  };
}

describe("delivering once", () => {
  it("posts once among eight senders at the same time", async () => {
    const store = new MemoryStore();
    const time = { now: 0 };
    let posts = 0;
    const post = async () => {
      posts++;
      await new Promise((resolve) => setImmediate(resolve));
      return undefined;
    };
    const outcomes = await Promise.all(
      Array.from({ length: 8 }, (_, n) => deliverOnce(posting(store, `p${n}`, time, post))),
    );
    expect(posts).toBe(1);
    expect(outcomes.filter((one) => one.status === "delivered")).toHaveLength(1);
    expect(outcomes.filter((one) => one.status === "already-delivered")).toHaveLength(7);
  });

  it("posts once among senders that share a name and start in the same moment", async () => {
    const store = new MemoryStore();
    const time = { now: 0 };
    let posts = 0;
    const post = async () => {
      posts++;
      return undefined;
    };
    await Promise.all(Array.from({ length: 8 }, () => deliverOnce(posting(store, "same", time, post))));
    expect(posts).toBe(1);
  });

  it("takes over from a sender that died before it posted", async () => {
    const store = new MemoryStore();
    const time = { now: 0 };
    const died = deliverOnce(posting(store, "dead", time, () => Promise.reject(new Error("killed"))));
    await expect(died).rejects.toThrow("killed");
    const outcome = await deliverOnce(posting(store, "alive", time, async () => undefined));
    expect(outcome.status).toBe("delivered");
    expect(time.now).toBeGreaterThanOrEqual(10_000);
  });

  it("marks what did not arrive, and tries it again when asked again", async () => {
    const store = new MemoryStore();
    const time = { now: 0 };
    const first = await deliverOnce(posting(store, "a", time, async () => "503"));
    expect(first).toEqual({ status: "undelivered", reason: "503" });
    expect(store.objects.has("runs/r/undelivered-business.json")).toBe(true);
    expect((await deliverOnce(posting(store, "b", time, async () => undefined))).status).toBe("delivered");
    expect((await deliverOnce(posting(store, "c", time, async () => "never asked"))).status).toBe(
      "already-delivered",
    );
  });

  it("gives up after twenty failed tries rather than posting for ever", async () => {
    const store = new MemoryStore();
    const time = { now: 0 };
    let posts = 0;
    for (let attempt = 0; attempt < 25; attempt++)
      await deliverOnce(posting(store, `p${attempt}`, time, async () => `${++posts}`));
    expect(posts).toBe(20);
  });
});
