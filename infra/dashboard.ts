import { Duration } from "aws-cdk-lib";
import {
  type Alarm,
  AlarmStatusWidget,
  Dashboard,
  GraphWidget,
  Stats,
  TextWidget,
} from "aws-cdk-lib/aws-cloudwatch";
import type { IFunction } from "aws-cdk-lib/aws-lambda";
import type { Construct } from "constructs";
import { ownMetric } from "./alarms.ts";

export interface JobDashboardProps {
  readonly deployment: string;
  readonly alarms: readonly Alarm[];
  readonly functions: readonly IFunction[];
  readonly storeName: string;
}

/** One screen: what is wrong, what runs did, what they took. */
export function jobDashboard(scope: Construct, props: JobDashboardProps): Dashboard {
  const day = Duration.days(1);
  const daily = (name: string) => ownMetric(props.deployment, name, Stats.MAXIMUM, day);
  const dashboard = new Dashboard(scope, "Dashboard", { defaultInterval: Duration.days(90) });
  dashboard.addWidgets(
    new TextWidget({ markdown: `# ebbwire: ${props.storeName}`, width: 24, height: 1 }),
    new AlarmStatusWidget({ title: "Alarms", alarms: [...props.alarms], width: 24, height: 3 }),
    new GraphWidget({ title: "Work", width: 8, left: [daily("Tables"), daily("Series")] }),
    new GraphWidget({ title: "Notices", width: 8, left: [daily("Notices"), daily("Stale")] }),
    new GraphWidget({
      title: "Trouble",
      width: 8,
      left: [daily("Failed"), daily("Left"), daily("Undelivered")],
    }),
    new GraphWidget({
      title: "Duration of a run and of invocations",
      width: 12,
      left: [
        daily("RunDuration"),
        ...props.functions.map((one) => one.metricDuration({ statistic: Stats.MAXIMUM, period: day })),
      ],
    }),
    new GraphWidget({
      title: "Errors",
      width: 12,
      left: props.functions.map((one) => one.metricErrors({ statistic: Stats.SUM, period: day })),
    }),
  );
  return dashboard;
}
