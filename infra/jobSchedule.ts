import { ArnFormat, Duration, Stack, TimeZone } from "aws-cdk-lib";
import { PolicyDocument, PolicyStatement, Role, ServicePrincipal } from "aws-cdk-lib/aws-iam";
import type { IFunction } from "aws-cdk-lib/aws-lambda";
import { Schedule, ScheduleExpression, ScheduleTargetInput } from "aws-cdk-lib/aws-scheduler";
import { LambdaInvoke } from "aws-cdk-lib/aws-scheduler-targets";
import type { IQueue } from "aws-cdk-lib/aws-sqs";
import type { Construct } from "constructs";

export interface JobScheduleProps {
  readonly function: IFunction;
  readonly deadLetters: IQueue;
  /** `rate(…)` or `cron(…)` as EventBridge Scheduler writes them. */
  readonly expression: string;
  readonly timeZone: string;
  readonly description: string;
  /** What the function receives. */
  readonly input: Readonly<Record<string, unknown>>;
}

/**
 * The role of the schedules: it may invoke that one function and send to that one queue, and only the Scheduler,
 * on behalf of this account's default group, may take it.
 */
export function schedulerRole(scope: Construct, target: IFunction, deadLetters: IQueue): Role {
  const stack = Stack.of(scope);
  const group = stack.formatArn({
    service: "scheduler",
    resource: "schedule-group",
    resourceName: "default",
    arnFormat: ArnFormat.SLASH_RESOURCE_NAME,
  });
  return new Role(scope, "SchedulerRole", {
    assumedBy: new ServicePrincipal("scheduler.amazonaws.com", {
      conditions: { StringEquals: { "aws:SourceAccount": stack.account, "aws:SourceArn": group } },
    }),
    inlinePolicies: {
      invoke: new PolicyDocument({
        statements: [
          new PolicyStatement({ actions: ["lambda:InvokeFunction"], resources: [target.functionArn] }),
          new PolicyStatement({ actions: ["sqs:SendMessage"], resources: [deadLetters.queueArn] }),
        ],
      }),
    },
  });
}

/** Invokes the function at the exact time, tries three times more within an hour, then tells the queue. */
export function jobSchedule(scope: Construct, id: string, role: Role, props: JobScheduleProps): Schedule {
  return new Schedule(scope, id, {
    description: props.description,
    schedule: ScheduleExpression.expression(props.expression, TimeZone.of(props.timeZone)),
    target: new LambdaInvoke(props.function, {
      // The target would add a right to every version of the function, which is more than is needed.
      role: role.withoutPolicyUpdates(),
      deadLetterQueue: props.deadLetters,
      retryAttempts: 3,
      maxEventAge: Duration.hours(1),
      input: ScheduleTargetInput.fromObject({ ...props.input }),
    }),
  });
}
