import { readRunHistory } from "../../lib/job/runHistory.ts";
import type { Cloud } from "./cloud.ts";
import type { Log } from "./log.ts";
import { watchMetrics } from "./metrics.ts";

export interface Watched {
  readonly outcome: "watched";
  readonly hoursSinceRun: number;
}

const hour = 3_600_000;

/**
 * Tells CloudWatch how long ago the newest run was planned. An alarm can look back one week at most, so a weekly
 * or monthly run that never came cannot be seen from run metrics alone; the store knows.
 *
 * A store that never saw a run counts as 0 hours: the first schedule may be a month away. With no run within
 * `withinHours` but some before, twice that is reported: over any boundary.
 */
export async function watchRuns(cloud: Cloud, log: Log, withinHours: number): Promise<Watched> {
  const now = cloud.clock();
  const { newest } = await readRunHistory(
    cloud.store,
    new Date(now - withinHours * hour).toISOString(),
    new Date(now),
  );
  const hoursSinceRun =
    newest !== undefined
      ? Math.max(0, (now - Date.parse(newest)) / hour)
      : (await cloud.store.list("runs/")).length > 0
        ? 2 * withinHours
        : 0;
  if (newest === undefined && hoursSinceRun === 0) log.info("no run yet: the first comes by the schedule");
  if (hoursSinceRun > withinHours) log.error("no run for too long", { hoursSinceRun, withinHours });
  log.document(watchMetrics(hoursSinceRun, cloud.deployment, now));
  return { outcome: "watched", hoursSinceRun };
}
