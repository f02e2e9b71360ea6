import { describe, expect, it } from "vitest";
import type { EbbwireProps } from "../../infra/ebbwire.ts";
import { policiesOf, type Statement } from "./policies.ts";
import { templateOf } from "./synthesise.ts";

const shapes: Record<string, EbbwireProps> = {
  "as it comes": {},
  "always with a fleet": { fleet: "always" },
  "with one function, in a VPC, with a key": {
    fleet: "never",
    kmsKeyArn: "arn:aws:kms:eu-west-1:123456789012:key/0a0a0a0a-1b1b-2c2c-3d3d-4e4e4e4e4e4e",
    subnetIds: ["subnet-0a0a0a0a"],
    securityGroupIds: ["sg-0a0a0a0a"],
  },
};

// Actions whose service knows no resource (service authorization reference: X-Ray, CloudWatch Logs' vended log
// delivery, EC2's network interfaces of Lambda's own guide).
const withoutResource =
  /^(xray:(Put|GetSampling)|logs:(\w+LogDeliver\w+|PutResourcePolicy|Describe\w+)$|ec2:\w+(NetworkInterfaces?|Subnets|PrivateIpAddresses)$)/;

describe.each(Object.entries(shapes))("the roles of the deployment %s", (_, choices) => {
  const policies = policiesOf(templateOf(choices));
  const statements = Object.values(policies).flat();

  it("name every action in full", () => {
    expect(statements.length).toBeGreaterThan(5);
    for (const action of statements.flatMap(({ actions }) => actions)) expect(action).not.toContain("*");
  });

  it("delete nothing in the store", () => {
    const deleting = statements.flatMap(({ actions }) => actions).filter((action) => /delete/i.test(action));
    // Their own log deliveries and network interfaces are all that Step Functions and Lambda take away.
    for (const action of deleting)
      expect(action).toMatch(/^(logs:DeleteLogDelivery|ec2:DeleteNetworkInterface)$/);
  });

  it("leave the resource open only where the service knows none", () => {
    const open = (statement: Statement) => statement.resources.includes("*");
    for (const action of statements.filter(open).flatMap(({ actions }) => actions))
      expect(action).toMatch(withoutResource);
  });

  it("reach objects only below the store's prefixes", () => {
    for (const { actions, resources } of statements)
      if (actions.some((action) => /^s3:(Get|Put)/.test(action)))
        for (const resource of resources)
          expect(resource).toMatch(/\/(settings\.json|(events|series|models|forecasts|runs)\/.*\*?.*)$/);
  });

  it("write nothing where the user's own files lie", () => {
    for (const { actions, resources } of statements)
      if (actions.includes("s3:PutObject"))
        for (const resource of resources) expect(resource).toMatch(/\/(models|forecasts|runs)\//);
  });

  it("list the bucket only by prefix", () => {
    for (const { actions, conditions } of statements)
      if (actions.includes("s3:ListBucket")) {
        expect(Object.keys(conditions)).toEqual(["StringLike"]);
        for (const prefix of conditions.StringLike["s3:prefix"]) expect(prefix).toMatch(/^[a-z]+[/.]/);
      }
  });

  it("let only those functions read the secret that deliver", () => {
    const readers = Object.entries(policies)
      .filter(([, own]) => own.some(({ actions }) => actions.includes("secretsmanager:GetSecretValue")))
      .map(([role]) => role.replace(/^Ebbwire|Role[0-9A-F]{8}$/g, ""));
    const expected = { auto: ["Closing", "Scheduled"], always: ["Closing"], never: ["Scheduled"] };
    expect(readers.sort()).toEqual(expected[choices.fleet ?? "auto"]);
  });
});

describe("a store below a prefix", () => {
  it("is all of the bucket that the roles reach", () => {
    const policies = policiesOf(templateOf({ bucketName: "their-bucket", prefix: "team/forecasts" }));
    const reached = Object.values(policies)
      .flat()
      .filter(({ actions }) => actions.some((action) => /^s3:/.test(action)));
    for (const { actions, resources, conditions } of reached)
      if (actions.includes("s3:ListBucket"))
        for (const prefix of conditions.StringLike["s3:prefix"]) expect(prefix).toMatch(/^team\/forecasts\//);
      else for (const resource of resources) expect(resource).toContain(":::their-bucket/team/forecasts/");
  });
});
