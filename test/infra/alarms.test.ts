import { Match } from "aws-cdk-lib/assertions";
import { describe, expect, it } from "vitest";
import { metricNamespace } from "../../functions/cloud/metrics.ts";
import { resourcesOf, templateOf } from "./synthesise.ts";

const alarmsOf = (template: ReturnType<typeof templateOf>) =>
  Object.fromEntries(
    resourcesOf(template, "AWS::CloudWatch::Alarm").map(([id, { Properties }]) => [
      id.replace(/^EbbwireAlarms/, "").replace(/[0-9A-F]{8}$/, ""),
      Properties,
    ]),
  );

const template = templateOf({ alarmTopicArn: "arn:aws:sns:eu-west-1:123456789012:alarms" });
const alarms = alarmsOf(template);

describe("the alarms", () => {
  it("are one for each thing to act on", () => {
    expect(Object.keys(alarms).sort()).toEqual([
      "DeadLetters",
      "Errors",
      "FleetFailed",
      "NearTimeLimit",
      "NoRun",
      "Undelivered",
    ]);
    expect(Object.keys(alarmsOf(templateOf({ fleet: "never" })))).not.toContain("FleetFailed");
  });

  it("go off at the first error, dead letter, undelivered message or failed fleet", () => {
    for (const name of ["DeadLetters", "Errors", "FleetFailed", "Undelivered"])
      expect(alarms[name]).toMatchObject({
        Threshold: 1,
        EvaluationPeriods: 1,
        ComparisonOperator: "GreaterThanOrEqualToThreshold",
        TreatMissingData: "notBreaching",
      });
  });

  it("go off at four fifths of the time limit", () => {
    expect(alarms.NearTimeLimit.Threshold).toBe(0.8 * 900_000);
  });

  it("go off when no run came for twice the period, or when nothing is heard at all", () => {
    expect(alarms.NoRun).toMatchObject({
      MetricName: "HoursSinceRun",
      Threshold: 2 * 7 * 24,
      ComparisonOperator: "GreaterThanThreshold",
      TreatMissingData: "breaching",
      Period: 6 * 3600,
      EvaluationPeriods: 2,
    });
    expect(alarmsOf(templateOf({ schedule: "rate(1 hour)" })).NoRun).toMatchObject({
      Threshold: 2,
      Period: 3600,
    });
  });

  it("look back no further than CloudWatch can: seven days, one for short periods", () => {
    // PutMetricAlarm: EvaluationPeriods times Period, 604,800 s at most, 86,400 s for periods under an hour.
    for (const schedule of ["rate(1 hour)", "rate(1 day)", "cron(0 6 1 * ? *)", "cron(0 6 1 1 ? *)"])
      for (const alarm of Object.values(alarmsOf(templateOf({ schedule })))) {
        const period = alarm.Period ?? alarm.Metrics[0].MetricStat?.Period ?? 300;
        expect(period * alarm.EvaluationPeriods).toBeLessThanOrEqual(period < 3600 ? 86_400 : 604_800);
      }
  });

  it("read the very namespace and dimension that the functions write", () => {
    for (const name of ["NoRun", "Undelivered"]) {
      expect(alarms[name].Namespace).toBe(metricNamespace);
      expect(alarms[name].Dimensions).toEqual([{ Name: "Deployment", Value: "Test/Ebbwire" }]);
    }
    for (const [, { Properties }] of resourcesOf(template, "AWS::Lambda::Function"))
      expect(Properties.Environment.Variables.EBBWIRE_DEPLOYMENT).toBe("Test/Ebbwire");
  });

  it("tell the topic that was named, or one made for an address, or nobody", () => {
    for (const alarm of Object.values(alarms)) {
      expect(alarm.AlarmActions).toEqual(["arn:aws:sns:eu-west-1:123456789012:alarms"]);
      expect(alarm.OKActions).toEqual(alarm.AlarmActions);
    }
    template.resourceCountIs("AWS::SNS::Topic", 0);
    const mailed = templateOf({ alarmEmail: "ops@example.org" });
    mailed.hasResourceProperties("AWS::SNS::Subscription", {
      Protocol: "email",
      Endpoint: "ops@example.org",
    });
    mailed.hasResourceProperties("AWS::SNS::TopicPolicy", {
      PolicyDocument: {
        Statement: Match.arrayWith([
          Match.objectLike({ Effect: "Deny", Condition: { Bool: { "aws:SecureTransport": "false" } } }),
          Match.objectLike({
            Effect: "Allow",
            Action: "sns:Publish",
            Principal: { Service: "cloudwatch.amazonaws.com" },
            Condition: { StringEquals: { "aws:SourceAccount": { Ref: "AWS::AccountId" } } },
          }),
        ]),
      },
    });
    for (const alarm of Object.values(alarmsOf(templateOf())))
      expect(alarm).not.toHaveProperty("AlarmActions");
  });
});

describe("the dashboard", () => {
  it("shows the alarms and every metric of a run", () => {
    const [[, { Properties }]] = resourcesOf(template, "AWS::CloudWatch::Dashboard");
    const body = JSON.stringify(Properties.DashboardBody);
    for (const name of [
      "Tables",
      "Series",
      "Notices",
      "Stale",
      "Failed",
      "Left",
      "Undelivered",
      "RunDuration",
    ])
      expect(body).toContain(`\\"Ebbwire\\",\\"${name}\\"`);
    expect(body).toContain("alarm");
  });

  it("is left out when it is not wanted", () => {
    templateOf({ dashboard: false }).resourceCountIs("AWS::CloudWatch::Dashboard", 0);
  });
});
