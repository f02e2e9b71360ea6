import type { Monitor } from "./monitor.ts";
import type { ChangeKind } from "./notice.ts";

/** One kind's statistic after each value since the monitor started (`null` where no look was made), and its boundary. */
export interface MonitorPath {
  readonly kind: ChangeKind;
  readonly boundary: number;
  readonly statistics: readonly (number | null)[];
}

/** What a picture of the monitor draws: a path and a boundary for each kind it watches. */
export function monitorPaths(monitor: Monitor): MonitorPath[] {
  return monitor.boundaries.map(({ kind, boundary }, index) => ({
    kind,
    boundary,
    statistics: monitor.statistics[index],
  }));
}
