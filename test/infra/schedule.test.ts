import { describe, expect, it } from "vitest";
import { resourcesOf, templateOf } from "./synthesise.ts";

const template = templateOf({ schedule: "cron(30 7 ? * TUE *)", timeZone: "Europe/Lisbon" });
const schedules = resourcesOf(template, "AWS::Scheduler::Schedule").map(([, { Properties }]) => Properties);
const [run, watch] = ["asOf", "watch"].map((word) =>
  schedules.find(({ Target }) => Target.Input.includes(word)),
);

describe("the schedule", () => {
  it("runs at the chosen time in the chosen time zone, exactly then", () => {
    expect(run).toMatchObject({
      ScheduleExpression: "cron(30 7 ? * TUE *)",
      ScheduleExpressionTimezone: "Europe/Lisbon",
      FlexibleTimeWindow: { Mode: "OFF" },
      State: "ENABLED",
    });
  });

  it("names the run by the time it was due, so that every retry names the same run", () => {
    // The context attribute as the Scheduler user guide writes it ("Adding context attributes").
    expect(JSON.parse(run.Target.Input)).toEqual({ asOf: "<aws.scheduler.scheduled-time>" });
  });

  it("tries three times in an hour and then tells the dead-letter queue", () => {
    for (const { Target } of schedules) {
      expect(Target.RetryPolicy).toEqual({ MaximumRetryAttempts: 3, MaximumEventAgeInSeconds: 3600 });
      expect(Target.DeadLetterConfig.Arn["Fn::GetAtt"][0]).toMatch(/DeadLetters/);
    }
  });

  it("asks every six hours how long ago a run was, and allows two weeks for a weekly one", () => {
    expect(watch.ScheduleExpression).toBe("rate(6 hours)");
    expect(JSON.parse(watch.Target.Input)).toEqual({ watch: { withinHours: 336 } });
  });

  it("may be taken only by the Scheduler for this account, to invoke one function and tell one queue", () => {
    const roles = resourcesOf(template, "AWS::IAM::Role").map(([, { Properties }]) => Properties);
    const [role] = roles.filter(({ AssumeRolePolicyDocument }) =>
      JSON.stringify(AssumeRolePolicyDocument).includes("scheduler.amazonaws.com"),
    );
    expect(role.AssumeRolePolicyDocument.Statement[0].Condition.StringEquals).toMatchObject({
      "aws:SourceAccount": { Ref: "AWS::AccountId" },
    });
    const statements = role.Policies.flatMap(
      ({ PolicyDocument }: { PolicyDocument: { Statement: object[] } }) => PolicyDocument.Statement,
    );
    expect(statements).toMatchObject([
      {
        Action: "lambda:InvokeFunction",
        Resource: { "Fn::GetAtt": [expect.stringMatching(/Scheduled/), "Arn"] },
      },
      {
        Action: "sqs:SendMessage",
        Resource: { "Fn::GetAtt": [expect.stringMatching(/DeadLetters/), "Arn"] },
      },
    ]);
  });
});

describe("a run that fails in the function", () => {
  it("is tried twice more in an hour by Lambda and then told to the dead-letter queue", () => {
    const [[, { Properties }]] = resourcesOf(template, "AWS::Lambda::EventInvokeConfig");
    expect(Properties).toMatchObject({ MaximumRetryAttempts: 2, MaximumEventAgeInSeconds: 3600 });
    expect(Properties.DestinationConfig.OnFailure.Destination["Fn::GetAtt"][0]).toMatch(/DeadLetters/);
  });

  it("waits two weeks in a queue that takes no plain-text request", () => {
    const [[, queue]] = resourcesOf(template, "AWS::SQS::Queue");
    expect(queue.Properties).toMatchObject({
      MessageRetentionPeriod: 14 * 86_400,
      SqsManagedSseEnabled: true,
    });
    const [[, policy]] = resourcesOf(template, "AWS::SQS::QueuePolicy");
    expect(policy.Properties.PolicyDocument.Statement[0]).toMatchObject({
      Effect: "Deny",
      Action: "sqs:*",
      Condition: { Bool: { "aws:SecureTransport": "false" } },
    });
  });
});
