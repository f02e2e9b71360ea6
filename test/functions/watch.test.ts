import { describe, expect, it } from "vitest";
import { runScheduled } from "../../functions/scheduled.ts";
import { MemoryStore } from "../support/memoryStore.ts";
import { lambdaContext, sampleEvent, testCloud } from "./testCloud.ts";

function watched(...instants: string[]) {
  const store = new MemoryStore();
  for (const instant of instants) store.objects.set(`runs/${instant}/plan.json`, new Uint8Array());
  const cloud = testCloud({ store, clock: () => Date.parse("2026-11-30T12:00:00Z") });
  return { cloud, outcome: runScheduled(sampleEvent("watch"), lambdaContext(), cloud) };
}

describe("the watch", () => {
  it("tells how long ago the newest run was", async () => {
    const { cloud, outcome } = watched("2026-11-16T06-00-00Z", "2026-11-30T06-00-00Z");
    expect(await outcome).toEqual({ outcome: "watched", hoursSinceRun: 6 });
    expect(cloud.lines().find(({ _aws }) => _aws)).toMatchObject({
      HoursSinceRun: 6,
      Deployment: "Test/Ebbwire",
    });
  });

  it("says more than is allowed when the newest run is too old, however old", async () => {
    for (const instant of ["2026-11-09T06-00-00Z", "2025-02-03T06-00-00Z"]) {
      const { cloud, outcome } = watched(instant);
      expect((await outcome) as object).toMatchObject({ outcome: "watched" });
      expect(cloud.lines().find(({ _aws }) => _aws).HoursSinceRun).toBeGreaterThan(336);
      expect(cloud.lines().map(({ level }) => level)).toContain("ERROR");
    }
  });

  it("gives a new deployment time until its first run", async () => {
    const { cloud, outcome } = watched();
    expect(await outcome).toEqual({ outcome: "watched", hoursSinceRun: 0 });
    expect(cloud.lines().map(({ level }) => level)).not.toContain("ERROR");
  });
});
