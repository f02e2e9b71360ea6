import { Duration } from "aws-cdk-lib";
import {
  Alarm,
  ComparisonOperator,
  type IMetric,
  MathExpression,
  Metric,
  Stats,
  TreatMissingData,
} from "aws-cdk-lib/aws-cloudwatch";
import { SnsAction } from "aws-cdk-lib/aws-cloudwatch-actions";
import type { IFunction } from "aws-cdk-lib/aws-lambda";
import type { ITopic } from "aws-cdk-lib/aws-sns";
import type { IQueue } from "aws-cdk-lib/aws-sqs";
import type { IStateMachine } from "aws-cdk-lib/aws-stepfunctions";
import { Construct } from "constructs";

export interface AlarmsProps {
  readonly functions: readonly IFunction[];
  readonly stateMachine: IStateMachine | undefined;
  readonly deadLetters: IQueue;
  readonly deployment: string;
  /** The functions' time limit. */
  readonly timeout: Duration;
  /** How often the watch reports, and how long ago the newest run may be. */
  readonly watchEvery: Duration;
  readonly runWithinHours: number;
  readonly topic: ITopic | undefined;
}

/** Share of its time limit from which a function is near it. */
const nearLimit = 0.8;

/** A number from the functions' own metrics. The namespace is the one `functions/cloud/metrics.ts` writes. */
export function ownMetric(
  deployment: string,
  metricName: string,
  statistic: string,
  period: Duration,
): Metric {
  return new Metric({
    namespace: "Ebbwire",
    metricName,
    dimensionsMap: { Deployment: deployment },
    statistic,
    period,
  });
}

/**
 * Alarms that each tell one thing a person should act on; to an optional topic, also when they clear.
 * The alarm on missing runs treats silence as bad, the others as good: no failure, no number.
 */
export class Alarms extends Construct {
  readonly all: readonly Alarm[];

  constructor(scope: Construct, id: string, props: AlarmsProps) {
    super(scope, id);
    const { functions, deadLetters, deployment, stateMachine, watchEvery } = props;
    const fiveMinutes = Duration.minutes(5);
    const errors = functions.map((one) => one.metricErrors({ period: fiveMinutes, statistic: Stats.SUM }));
    const durations = functions.map((one) =>
      one.metricDuration({ period: fiveMinutes, statistic: Stats.MAXIMUM }),
    );
    this.all = [
      this.#alarm(
        "Errors",
        combined(errors, "SUM"),
        1,
        "A function of ebbwire failed: read its log by the run id.",
      ),
      this.#alarm(
        "DeadLetters",
        deadLetters.metricApproximateNumberOfMessagesVisible({
          period: fiveMinutes,
          statistic: Stats.MAXIMUM,
        }),
        1,
        "A run was given up after all tries: its event waits in the dead-letter queue. Mend the cause and invoke the function with it.",
      ),
      this.#alarm(
        "Undelivered",
        ownMetric(deployment, "Undelivered", Stats.SUM, fiveMinutes),
        1,
        "A message could not be delivered: it goes out first with the next run. Check the webhook.",
      ),
      this.#alarm(
        "NearTimeLimit",
        combined(durations, "MAX"),
        Math.round(props.timeout.toMilliseconds() * nearLimit),
        "A function came near its time limit: give it more memory, or turn the fleet on.",
      ),
      new Alarm(this, "NoRun", {
        metric: ownMetric(deployment, "HoursSinceRun", Stats.MINIMUM, watchEvery),
        threshold: props.runWithinHours,
        comparisonOperator: ComparisonOperator.GREATER_THAN_THRESHOLD,
        evaluationPeriods: 2,
        treatMissingData: TreatMissingData.BREACHING,
        alarmDescription:
          "No run for twice the period, or nothing heard from the watch: look at the schedule.",
      }),
      ...(stateMachine === undefined ? [] : [this.#fleetAlarm(stateMachine, fiveMinutes)]),
    ];
    if (props.topic !== undefined) {
      const action = new SnsAction(props.topic);
      for (const alarm of this.all) {
        alarm.addAlarmAction(action);
        alarm.addOkAction(action);
      }
    }
  }

  #fleetAlarm(machine: IStateMachine, period: Duration): Alarm {
    const ended = [machine.metricFailed, machine.metricTimedOut, machine.metricAborted];
    const metrics = ended.map((metric) => metric.call(machine, { period, statistic: Stats.SUM }));
    return this.#alarm(
      "FleetFailed",
      combined(metrics, "SUM"),
      1,
      "A fleet's run did not end well: open the execution, mend the cause, and redrive it.",
    );
  }

  #alarm(id: string, metric: IMetric, threshold: number, alarmDescription: string): Alarm {
    return new Alarm(this, id, {
      metric,
      threshold,
      alarmDescription,
      evaluationPeriods: 1,
      comparisonOperator: ComparisonOperator.GREATER_THAN_OR_EQUAL_TO_THRESHOLD,
      treatMissingData: TreatMissingData.NOT_BREACHING,
    });
  }
}

/** Several metrics as one number; one metric stays itself. */
function combined(metrics: readonly IMetric[], how: "SUM" | "MAX"): IMetric {
  if (metrics.length === 1) return metrics[0];
  const names = metrics.map((_, index) => `m${index + 1}`);
  return new MathExpression({
    expression: `${how}([${names.map((name) => `FILL(${name}, 0)`).join(", ")}])`,
    usingMetrics: Object.fromEntries(metrics.map((metric, index) => [names[index], metric])),
    period: Duration.minutes(5),
  });
}
