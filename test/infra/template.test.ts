import { Match } from "aws-cdk-lib/assertions";
import { describe, expect, it } from "vitest";
import { resourcesOf, templateOf } from "./synthesise.ts";

const template = templateOf({ costCenter: "counter-7", timeZone: "Europe/Lisbon" });

describe("the bucket", () => {
  it("is private, owner-enforced, encrypted and versioned", () => {
    template.hasResourceProperties("AWS::S3::Bucket", {
      PublicAccessBlockConfiguration: {
        BlockPublicAcls: true,
        BlockPublicPolicy: true,
        IgnorePublicAcls: true,
        RestrictPublicBuckets: true,
      },
      OwnershipControls: { Rules: [{ ObjectOwnership: "BucketOwnerEnforced" }] },
      BucketEncryption: {
        ServerSideEncryptionConfiguration: [{ ServerSideEncryptionByDefault: { SSEAlgorithm: "AES256" } }],
      },
      VersioningConfiguration: { Status: "Enabled" },
    });
  });

  it("refuses every request without TLS 1.2", () => {
    const denied = (Condition: object) =>
      Match.objectLike({ Effect: "Deny", Action: "s3:*", Principal: { AWS: "*" }, Condition });
    template.hasResourceProperties("AWS::S3::BucketPolicy", {
      PolicyDocument: {
        Statement: Match.arrayWith([
          denied({ Bool: { "aws:SecureTransport": "false" } }),
          denied({ NumericLessThan: { "s3:TlsVersion": 1.2 } }),
        ]),
      },
    });
  });

  it("stays when the stack goes", () => {
    for (const [, bucket] of resourcesOf(template, "AWS::S3::Bucket"))
      expect(bucket).toMatchObject({ DeletionPolicy: "Retain", UpdateReplacePolicy: "Retain" });
  });

  it("lets go of replaced versions after a year and of unfinished uploads after a week, never of what stands", () => {
    const [[, { Properties }]] = resourcesOf(template, "AWS::S3::Bucket");
    expect(Properties.LifecycleConfiguration.Rules).toEqual([
      {
        Id: "old-versions",
        Status: "Enabled",
        NoncurrentVersionExpiration: { NoncurrentDays: 365 },
        ExpiredObjectDeleteMarker: true,
      },
      {
        Id: "unfinished-uploads",
        Status: "Enabled",
        AbortIncompleteMultipartUpload: { DaysAfterInitiation: 7 },
      },
    ]);
  });

  it("is not made where an existing one is named, and keys go below the prefix", () => {
    const theirs = templateOf({ bucketName: "their-bucket", prefix: "team/forecasts" });
    theirs.resourceCountIs("AWS::S3::Bucket", 0);
    theirs.resourceCountIs("AWS::S3::BucketPolicy", 0);
    theirs.hasResourceProperties("AWS::Lambda::Function", {
      Environment: { Variables: Match.objectLike({ EBBWIRE_STORE: "s3://their-bucket/team/forecasts" }) },
    });
  });
});

describe("each function", () => {
  const functions = resourcesOf(template, "AWS::Lambda::Function");

  it("runs on Node 24, arm64, with one vCPU at least, a quarter of an hour, traces and JSON logs", () => {
    expect(functions).toHaveLength(3);
    for (const [, { Properties }] of functions)
      expect(Properties).toMatchObject({
        Runtime: "nodejs24.x",
        Architectures: ["arm64"],
        Timeout: 900,
        TracingConfig: { Mode: "Active" },
        LoggingConfig: { LogFormat: "JSON" },
      });
    const memory = Object.fromEntries(
      functions.map(([id, { Properties }]) => [
        /^Ebbwire(\w+?)Function/.exec(id)?.[1],
        Properties.MemorySize,
      ]),
    );
    // 1,769 MB is one vCPU (Lambda developer guide, "Configure function memory").
    expect(memory).toEqual({ Scheduled: 1769, Portion: 1769, Closing: 3008 });
  });

  it("has a log group of its own that forgets after 90 days", () => {
    const groups = functions.map(([, { Properties }]) => Properties.LoggingConfig.LogGroup.Ref);
    expect(new Set(groups).size).toBe(3);
    const made = Object.fromEntries(resourcesOf(template, "AWS::Logs::LogGroup"));
    for (const group of groups) expect(made[group].Properties.RetentionInDays).toBe(90);
  });

  it("reserves no concurrency unless asked, which would break the first deploy of a new account", () => {
    for (const [, { Properties }] of functions)
      expect(Properties).not.toHaveProperty("ReservedConcurrentExecutions");
    const asked = resourcesOf(templateOf({ reservedConcurrency: 20 }), "AWS::Lambda::Function");
    expect(asked.filter(([, { Properties }]) => Properties.ReservedConcurrentExecutions === 20)).toHaveLength(
      1,
    );
  });

  it("holds no secret in its environment, only the secret's name", () => {
    for (const [, { Properties }] of functions)
      for (const [name, value] of Object.entries(Properties.Environment.Variables))
        if (name === "EBBWIRE_SECRET") expect(value).toEqual({ Ref: expect.stringMatching(/Webhooks/) });
    const [[, secret]] = resourcesOf(template, "AWS::SecretsManager::Secret");
    expect(secret.Properties.GenerateSecretString).toEqual({});
    expect(secret.Properties).not.toHaveProperty("SecretString");
  });

  it("stands in the given subnets and security groups, with nothing looked up", () => {
    const inside = templateOf({
      subnetIds: ["subnet-0a0a0a0a", "subnet-0b0b0b0b"],
      securityGroupIds: ["sg-0a0a0a0a"],
    });
    for (const [, { Properties }] of resourcesOf(inside, "AWS::Lambda::Function"))
      expect(Properties.VpcConfig).toEqual({
        SubnetIds: ["subnet-0a0a0a0a", "subnet-0b0b0b0b"],
        SecurityGroupIds: ["sg-0a0a0a0a"],
      });
  });
});

describe("the whole", () => {
  it("carries cost tags on everything that can be tagged and costs", () => {
    for (const type of [
      "AWS::S3::Bucket",
      "AWS::Lambda::Function",
      "AWS::StepFunctions::StateMachine",
      "AWS::Logs::LogGroup",
      "AWS::SecretsManager::Secret",
      "AWS::SQS::Queue",
    ])
      for (const [, { Properties }] of resourcesOf(template, type)) {
        expect(Properties.Tags).toContainEqual({ Key: "application", Value: "ebbwire" });
        expect(Properties.Tags).toContainEqual({ Key: "cost-center", Value: "counter-7" });
      }
  });

  it("tells the next steps in its outputs: a table, the secret, a run", () => {
    const outputs = JSON.stringify(template.toJSON().Outputs);
    expect(outputs).toContain("/series/my-table.csv");
    expect(outputs).toContain("aws secretsmanager put-secret-value");
    expect(outputs).toContain("aws lambda invoke");
  });
});
