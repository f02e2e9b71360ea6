import { describe, expect, it } from "vitest";
import { bundle } from "../support/bundle.ts";
import { leaks } from "../support/canary.ts";
import { hasGateway } from "../support/cephStore.ts";
import { type CrashPoint, crashingStore, type Operation } from "../support/crashingStore.ts";
import { seeded } from "../support/faultProxy.ts";
import { inTurns } from "../support/inTurns.ts";
import { type Receiver, receiver } from "../support/receiver.ts";
import {
  childRun,
  documents,
  hookOf,
  strayFiles,
  type TinyStore,
  tinyRun,
  tinyStores,
} from "../support/tinyRun.ts";

const anHour = 3_600_000;

describe.each(["folder", "bucket"] as const)("a run of three tables on a %s", (kind) => {
  const fresh = tinyStores(kind);
  let undisturbed: Record<string, string>;
  let operations: readonly Operation[];
  let note: string;

  /** What an undisturbed run writes and which operations it makes; found once. */
  async function reference(hook: Receiver): Promise<void> {
    if (undisturbed !== undefined) return;
    const { store } = await fresh();
    const watched = crashingStore(store);
    const summary = await tinyRun(watched, hookOf(hook.port, "undisturbed"));
    expect(summary).toMatchObject({ tables: 3, failed: [], deliveries: [{ status: "delivered" }] });
    operations = watched.operations;
    undisturbed = await documents(store);
    note = hook.received[0]!.body;
  }

  const posts = (hook: Receiver, mark: string) =>
    hook.received.filter(({ path }) => path.endsWith(`?run=${mark}`));

  /** After a crash: a plain retry an hour later, and nothing lost, doubled, left over or leaked. Tells how many posts came. */
  async function checkRetry(tiny: TinyStore, hook: Receiver, mark: string): Promise<number> {
    const retried = tiny.reopen();
    const summary = await tinyRun(retried, hookOf(hook.port, mark), anHour);
    expect(summary, mark).toMatchObject({ tables: 3, failed: [], left: [] });
    expect(await documents(retried), mark).toEqual(undisturbed);
    expect(await strayFiles(retried), mark).toEqual([]);
    const came = posts(hook, mark);
    for (const post of came) {
      expect(post.body).toBe(note);
      expect(leaks(post.body), mark).toEqual([]);
    }
    expect(new Set(came.map(({ headers }) => headers["webhook-id"])).size).toBe(1);
    return came.length;
  }

  const everyPoint = (how: CrashPoint["how"]): CrashPoint[] =>
    operations.flatMap((_, index) =>
      (["before", "after"] as const).map((when) => ({ operation: index + 1, when, how })),
    );

  /** The one moment at which a message may come twice: the webhook has answered and the proof does not stand yet. */
  const betweenAnswerAndProof = () => {
    const proof = operations.findIndex(
      ({ action, key }) => action === "create" && key.includes("/delivered-"),
    );
    return `${proof + 1} before`;
  };

  it.skipIf(kind === "bucket" && !hasGateway)(
    "is completed by a plain retry after the store failed before or after any one operation",
    async () => {
      const hook = await receiver();
      await reference(hook);
      const doubled: string[] = [];
      await inTurns(everyPoint("throw"), 4, async (point) => {
        const tiny = await fresh();
        const mark = `throw-${point.operation}-${point.when}`;
        const broken = tinyRun(crashingStore(tiny.store, point), hookOf(hook.port, mark));
        const error: unknown = await broken.then(
          () => undefined,
          (found: unknown) => found,
        );
        expect(String(error), mark).toContain("crash as told");
        if ((await checkRetry(tiny, hook, mark)) > 1) doubled.push(`${point.operation} ${point.when}`);
      });
      console.info(`${kind}: ${2 * operations.length} points of failure; doubled: ${doubled.join(", ")}`);
      expect(doubled).toEqual([betweenAnswerAndProof()]);
    },
    600_000,
  );

  it.skipIf(kind === "bucket" && !hasGateway)(
    "is completed by a plain retry after its process was killed before or after any one operation",
    async () => {
      const hook = await receiver();
      await reference(hook);
      const program = await bundle("test/support/jobChild.ts");
      const doubled: string[] = [];
      await inTurns(everyPoint("kill"), 3, async (point) => {
        const tiny = await fresh();
        const mark = `kill-${point.operation}-${point.when}`;
        const end = await childRun(program, tiny, hookOf(hook.port, mark), { point });
        expect(end, mark).toMatchObject({ signal: "SIGKILL" });
        expect(leaks(end.output), mark).toEqual([]);
        if ((await checkRetry(tiny, hook, mark)) > 1) doubled.push(`${point.operation} ${point.when}`);
      });
      console.info(`${kind}: ${2 * operations.length} kills; doubled: ${doubled.join(", ")}`);
      expect(doubled).toEqual([betweenAnswerAndProof()]);
    },
    900_000,
  );

  it.skipIf(kind === "bucket" && !hasGateway)(
    "is completed by a plain retry after its process was killed at any of twenty random moments",
    async () => {
      const hook = await receiver();
      await reference(hook);
      const program = await bundle("test/support/jobChild.ts");
      const began = Date.now();
      const whole = await childRun(program, await fresh(), hookOf(hook.port, "whole"), {});
      expect(whole).toMatchObject({ code: 0 });
      expect(leaks(whole.output)).toEqual([]);
      const usual = Date.now() - began;
      const next = seeded(3);
      const kills = Array.from({ length: 20 }, (_, kill) => ({ kill, after: usual * (0.2 + 0.8 * next()) }));
      await inTurns(kills, 3, async ({ kill, after }) => {
        const tiny = await fresh();
        const mark = `moment-${kill}`;
        await childRun(program, tiny, hookOf(hook.port, mark), {}, after);
        expect(await checkRetry(tiny, hook, mark)).toBeLessThanOrEqual(2);
      });
    },
    300_000,
  );
});
