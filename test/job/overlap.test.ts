import { describe, expect, it } from "vitest";
import { bundle } from "../support/bundle.ts";
import { leaks } from "../support/canary.ts";
import { hasGateway } from "../support/cephStore.ts";
import { receiver } from "../support/receiver.ts";
import { childRun, documents, hookOf, strayFiles, tinyRun, tinyStores } from "../support/tinyRun.ts";

describe.each(["folder", "bucket"] as const)("processes at work on the same run of a %s", (kind) => {
  const fresh = tinyStores(kind);

  it.skipIf(kind === "bucket" && !hasGateway).each([2, 8])(
    "%i of them write the same documents as one, and post once",
    async (count) => {
      const hook = await receiver();
      const alone = await fresh();
      await tinyRun(alone.store, hookOf(hook.port, "alone"));
      const shared = await fresh();
      const program = await bundle("test/support/jobChild.ts");
      const ends = await Promise.all(
        Array.from({ length: count }, () => childRun(program, shared, hookOf(hook.port, "shared"), {})),
      );
      for (const end of ends) {
        expect(end).toMatchObject({ code: 0 });
        expect(leaks(end.output)).toEqual([]);
      }
      const statuses = ends.map(({ output }) => /"status":"([a-z-]+)"/.exec(output)?.[1]).sort();
      expect(statuses).toEqual([...Array(count - 1).fill("already-delivered"), "delivered"]);
      expect(await documents(shared.store)).toEqual(await documents(alone.store));
      expect(await strayFiles(shared.store)).toEqual([]);
      const posts = hook.received.filter(({ path }) => path.endsWith("?run=shared"));
      expect(posts).toHaveLength(1);
      expect(posts[0]!.body).toBe(hook.received[0]!.body);
    },
    300_000,
  );

  it.skipIf(kind === "bucket" && !hasGateway)(
    "all report a webhook that refuses, and the next run sends its note first",
    async () => {
      let up = false;
      const hook = await receiver((response) => response.writeHead(up ? 200 : 400).end());
      const tiny = await fresh();
      const address = hookOf(hook.port, "down");
      const both = await Promise.all([tinyRun(tiny.store, address), tinyRun(tiny.store, address)]);
      for (const { deliveries } of both) expect(deliveries).toMatchObject([{ status: "undelivered" }]);
      expect(leaks(JSON.stringify(both))).toEqual([]);
      await documents(tiny.store);
      // The later of the two may have found the first one's failure and tried for itself.
      const refusals = hook.received.length;
      expect(refusals).toBeLessThanOrEqual(2);
      up = true;
      const next = await tinyRun(tiny.store, address, 7 * 24 * 3_600_000, "2026-12-07T06:00:00Z");
      expect(next.deliveries.map(({ asOf, status }) => `${asOf} ${status}`)).toEqual([
        "2026-11-30T06:00:00Z delivered",
        "2026-12-07T06:00:00Z delivered",
      ]);
      expect(hook.received).toHaveLength(refusals + 2);
      const again = hook.received[refusals]!;
      for (const refused of hook.received.slice(0, refusals)) {
        expect(again.headers["webhook-id"]).toBe(refused.headers["webhook-id"]);
        expect(again.body).toBe(refused.body);
      }
    },
    120_000,
  );
});
