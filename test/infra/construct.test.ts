import { App, Stack } from "aws-cdk-lib";
import { Template } from "aws-cdk-lib/assertions";
import { Function as LambdaFunction } from "aws-cdk-lib/aws-lambda";
import { Bucket } from "aws-cdk-lib/aws-s3";
import { describe, expect, it } from "vitest";
import { Ebbwire } from "../../infra/index.ts";
import { projectRoot } from "../../infra/projectRoot.ts";
import { resourcesOf } from "./synthesise.ts";

/** Someone else's app: none of our feature flags, a stack of their own around it. */
function theirStack(): Stack {
  return new Stack(new App({ context: { "aws:cdk:bundling-stacks": [] } }), "Theirs");
}

describe("the construct in someone else's app", () => {
  it("brings the whole, the fleet's result writer included, without any of our feature flags", () => {
    const stack = theirStack();
    new Bucket(stack, "TheirBucket");
    new Ebbwire(stack, "Forecasts", { schedule: "rate(1 day)" });
    const template = Template.fromStack(stack);
    template.resourceCountIs("AWS::S3::Bucket", 2);
    template.resourceCountIs("AWS::Lambda::Function", 3);
    const [[, machine]] = resourcesOf(template, "AWS::StepFunctions::StateMachine");
    expect(JSON.stringify(machine.Properties.DefinitionString)).toContain("ResultWriter");
  });

  it("gives its parts to what stands around it", () => {
    const stack = theirStack();
    const ebbwire = new Ebbwire(stack, "Forecasts", { fleet: "never" });
    expect(ebbwire.bucket.bucketName).toBeTruthy();
    expect(ebbwire.scheduledFunction).toBeInstanceOf(LambdaFunction);
    expect(ebbwire.stateMachine).toBeUndefined();
    expect(ebbwire.alarms.length).toBeGreaterThan(3);
    expect(ebbwire.webhookSecret.secretArn).toBeTruthy();
    expect(ebbwire.deadLetters.queueArn).toBeTruthy();
  });

  it("may stand twice in a stack without the two being mixed up in metrics", () => {
    const stack = theirStack();
    new Ebbwire(stack, "North", { fleet: "never" });
    new Ebbwire(stack, "South", { fleet: "never", bucketName: "their-bucket" });
    const names = resourcesOf(Template.fromStack(stack), "AWS::Lambda::Function").map(
      ([, { Properties }]) => Properties.Environment.Variables.EBBWIRE_DEPLOYMENT,
    );
    expect(names.sort()).toEqual(["Theirs/North", "Theirs/South"]);
  });

  it("tags only what is its own", () => {
    const stack = theirStack();
    new Bucket(stack, "TheirBucket");
    new Ebbwire(stack, "Forecasts");
    const buckets = resourcesOf(Template.fromStack(stack), "AWS::S3::Bucket");
    const theirs = buckets.find(([id]) => id.startsWith("TheirBucket"));
    expect(theirs?.[1].Properties ?? {}).not.toHaveProperty("Tags");
  });

  it("refuses wrong choices with a sentence", () => {
    expect(() => new Ebbwire(theirStack(), "Forecasts", { timeZone: "Mars/Base" })).toThrow(
      /timeZone must be an IANA/,
    );
  });
});

describe("the project's folder", () => {
  const root = process.cwd();

  it("is found from a bundle below it, whatever the working folder", () => {
    expect(projectRoot(`${root}/dist/infra.mjs`, "/")).toBe(root);
    expect(projectRoot(`${root}/infra/projectRoot.ts`, "/")).toBe(root);
  });

  it("is found from the working folder when the app was bundled elsewhere", () => {
    expect(projectRoot("/elsewhere/app.mjs", `${root}/test/infra`)).toBe(root);
  });

  it("is asked for when it is nowhere", () => {
    expect(() => projectRoot("/elsewhere/app.mjs", "/")).toThrow(/give its folder as projectRoot/);
  });
});
