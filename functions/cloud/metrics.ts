import type { RunSummary } from "../../lib/job/summary.ts";

/** CloudWatch namespace of all metrics; alarms and dashboard name the same one. */
export const metricNamespace = "Ebbwire";

type Unit = "Count" | "Milliseconds" | "None";

/**
 * Metrics in CloudWatch's embedded metric format: a log line from which CloudWatch takes numbers, with no
 * request of ours. One dimension, the deployment, so that each metric costs once a deployment.
 *
 * @see https://docs.aws.amazon.com/AmazonCloudWatch/latest/monitoring/CloudWatch_Embedded_Metric_Format_Specification.html
 */
function embedded(
  deployment: string,
  timestamp: number,
  values: Readonly<Record<string, readonly [value: number, unit: Unit]>>,
): object {
  const metrics = Object.entries(values).map(([Name, [, Unit]]) => ({ Name, Unit }));
  return {
    _aws: {
      Timestamp: timestamp,
      CloudWatchMetrics: [{ Namespace: metricNamespace, Dimensions: [["Deployment"]], Metrics: metrics }],
    },
    Deployment: deployment,
    ...Object.fromEntries(Object.entries(values).map(([name, [value]]) => [name, value])),
  };
}

/** The numbers of one finished run. */
export function runMetrics(summary: RunSummary, deployment: string, timestamp: number): object {
  return embedded(deployment, timestamp, {
    Tables: [summary.tables, "Count"],
    Series: [summary.series, "Count"],
    Notices: [summary.notices, "Count"],
    Stale: [summary.stale.length, "Count"],
    Failed: [summary.failed.length, "Count"],
    Left: [summary.left.length, "Count"],
    Undelivered: [summary.deliveries.filter(({ status }) => status === "undelivered").length, "Count"],
    RunDuration: [Math.round(summary.durationMilliseconds), "Milliseconds"],
  });
}

/** How long ago the newest run was: what the alarm on missing runs watches. */
export function watchMetrics(hoursSinceRun: number, deployment: string, timestamp: number): object {
  return embedded(deployment, timestamp, { HoursSinceRun: [hoursSinceRun, "None"] });
}
