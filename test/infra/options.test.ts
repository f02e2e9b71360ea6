import { App } from "aws-cdk-lib";
import { describe, expect, it } from "vitest";
import { optionsFromContext } from "../../infra/context.ts";
import { checkOptions } from "../../infra/options.ts";
import { longestGapHours, scheduleFault } from "../../infra/schedulePeriod.ts";

const fromContext = (context: Record<string, unknown>) => optionsFromContext(new App({ context }).node);

describe("the choices of a deployment", () => {
  it("all have a default that works", () => {
    expect(fromContext({})).toMatchObject({
      schedule: "cron(0 6 ? * MON *)",
      timeZone: "UTC",
      memory: 1769,
      fleet: "auto",
    });
  });

  it("may be text from the command line or values from cdk.json", () => {
    expect(
      fromContext({ "ebbwire:memory": "3008", "ebbwire:dashboard": "false", "ebbwire:logRetentionDays": 30 }),
    ).toMatchObject({ memory: 3008, dashboard: false, logRetentionDays: 30 });
    expect(
      fromContext({
        "ebbwire:subnetIds": "subnet-0a0a0a0a, subnet-0b0b0b0b",
        "ebbwire:securityGroupIds": ["sg-0a0a0a0a"],
      }),
    ).toMatchObject({ subnetIds: ["subnet-0a0a0a0a", "subnet-0b0b0b0b"], securityGroupIds: ["sg-0a0a0a0a"] });
  });

  it("leave the context of others alone but refuse a misspelt one of their own, naming those known", () => {
    expect(() => fromContext({ timezone: "Mars/Base", "@aws-cdk/x": 1 })).not.toThrow();
    expect(() => fromContext({ "ebbwire:timezone": "Europe/Lisbon" })).toThrow(
      /ebbwire:timezone is not known; known are .*timeZone/,
    );
  });

  it("are refused all at once, each with its name, what it must be and what was received", () => {
    const wrong = {
      "ebbwire:timeZone": "Mars/Base",
      "ebbwire:memory": "17",
      "ebbwire:fleet": "sometimes",
      "ebbwire:kmsKeyArn": "alias/mine",
      "ebbwire:prefix": "/leading",
    };
    let message = "";
    try {
      fromContext(wrong);
    } catch (error) {
      message = (error as Error).message;
    }
    expect(message).toContain(
      'ebbwire:timeZone must be an IANA time zone such as Europe/Lisbon, received "Mars/Base"',
    );
    expect(message).toContain("ebbwire:memory");
    expect(message).toContain('ebbwire:fleet must be "auto", "always" or "never", received "sometimes"');
    expect(message).toContain("ebbwire:kmsKeyArn must be the ARN of a KMS key (not an alias)");
    expect(message).toContain("ebbwire:prefix");
  });

  it.each([
    [{ subnetIds: ["subnet-0a0a0a0a"] }, /securityGroupIds need each other/],
    [
      { alarmEmail: "a@example.org", alarmTopicArn: "arn:aws:sns:eu-west-1:123456789012:x" },
      /subscribe the address/,
    ],
    [{ logRetentionDays: 45 }, /must be one of 1, 3, 5/],
    [{ alarmEmail: "nobody" }, /e-mail/],
  ])("that do not go together or do not exist are refused: %j", (choices, message) => {
    expect(() => checkOptions(choices)).toThrow(message);
  });
});

describe("a schedule", () => {
  it.each([
    "rate(7 days)",
    "rate(1 hour)",
    "cron(0 6 ? * MON *)",
    "cron(15 4 1 * ? *)",
    "cron(0 6 ? * 2#1 *)",
    "cron(0 6 L * ? *)",
  ])("may be %s", (text) => {
    expect(scheduleFault(text)).toBeUndefined();
  });

  it.each([
    ["weekly", /must be rate/],
    ["at(2026-11-30T06:00:00)", /must be rate/],
    ["rate(5 minutes)", /hourly/],
    ["cron(*/5 * ? * MON *)", /hourly/],
    ["cron(0 6 * * MON *)", /\?/],
    ["cron(0 6 ? * MON)", /six fields/],
  ])("may not be %s", (text, message) => {
    expect(scheduleFault(text)).toMatch(message);
  });

  it.each([
    ["rate(7 days)", 168],
    ["rate(90 minutes)", 1.5],
    ["cron(0 * * * ? *)", 1],
    ["cron(0 6 * * ? *)", 24],
    ["cron(0 6 ? * MON-FRI *)", 168],
    ["cron(0 6 1 * ? *)", 744],
    ["cron(0 6 ? * 2#1 *)", 840],
    ["cron(0 6 1 1 ? *)", 8784],
  ])("of %s leaves at most %d hours between runs", (text, hours) => {
    expect(longestGapHours(text)).toBe(hours);
  });
});
