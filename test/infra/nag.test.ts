import { type App, Validations } from "aws-cdk-lib";
import { PolicyStatement } from "aws-cdk-lib/aws-iam";
import { Bucket } from "aws-cdk-lib/aws-s3";
import { AwsSolutionsChecks } from "cdk-nag";
import { describe, expect, it } from "vitest";
import type { EbbwireProps } from "../../infra/ebbwire.ts";
import type { EbbwireStack } from "../../infra/ebbwireStack.ts";
import { stackOf } from "./synthesise.ts";

// cdk-nag's AwsSolutions pack on every shape of deployment.
const shapes: Record<string, EbbwireProps> = {
  "as it comes": {},
  "with a fleet always": { fleet: "always", alarmEmail: "ops@example.org" },
  "with one function": { fleet: "never", reservedConcurrency: 1, dashboard: false },
  "in an existing bucket with a key": {
    bucketName: "their-bucket",
    prefix: "team/forecasts",
    kmsKeyArn: "arn:aws:kms:eu-west-1:123456789012:key/0a0a0a0a-1b1b-2c2c-3d3d-4e4e4e4e4e4e",
  },
  "in a VPC": { subnetIds: ["subnet-0a0a0a0a", "subnet-0b0b0b0b"], securityGroupIds: ["sg-0a0a0a0a"] },
};

function findings(stack: EbbwireStack, heedingAcknowledgements = true): string[] {
  const pack = new AwsSolutionsChecks(stack.node.root as App);
  // To see what would be found without them.
  if (!heedingAcknowledgements) Object.assign(pack, { isAcknowledged: () => false });
  return pack
    .validateScope(stack.node.root)
    .violations.flatMap(({ ruleName, violatingResources }) =>
      violatingResources.map(({ constructPath }) => `${ruleName} ${constructPath}`),
    );
}

function acknowledgements(stack: EbbwireStack): { path: string; rule: string; reason: string }[] {
  return stack.node.findAll().flatMap(({ node }) =>
    node.metadata
      .filter(({ type }) => type === Validations.ACKNOWLEDGED_RULES_METADATA_KEY)
      .flatMap(({ data }) => Object.entries(data as Record<string, string>))
      .map(([rule, reason]) => ({ path: node.path, rule: rule.replace(/^Annotation::/, ""), reason })),
  );
}

describe.each(Object.entries(shapes))("the deployment %s", (_, choices) => {
  it("has no finding that is not acknowledged", () => {
    expect(findings(stackOf(choices))).toEqual([]);
  });

  it("acknowledges only what is found, each with a reason of a sentence", () => {
    const stack = stackOf(choices);
    const found = findings(stack, false);
    const given = acknowledgements(stack);
    expect(given.length).toBeGreaterThan(0);
    for (const { path, rule, reason } of given) {
      expect(found.filter((one) => one.startsWith(`${rule} ${path}`))).not.toEqual([]);
      expect(reason).toMatch(/^[A-Z].{30,}\.$/);
    }
  });

  it("acknowledges wildcards one by one, never the rule as a whole", () => {
    for (const { rule } of acknowledgements(stackOf(choices))) expect(rule).not.toBe("AwsSolutions-IAM5");
  });
});

describe("the rule pack", () => {
  it("fires on a bucket without TLS and on a function that may do anything", () => {
    const stack = stackOf();
    new Bucket(stack, "Spoilt");
    stack.ebbwire.scheduledFunction.addToRolePolicy(
      new PolicyStatement({ actions: ["s3:*"], resources: [stack.ebbwire.bucket.arnForObjects("*")] }),
    );
    const found = findings(stack).join("\n");
    expect(found).toContain("AwsSolutions-S10 Test/Spoilt");
    expect(found).toContain("AwsSolutions-IAM5[Action::s3:*] Test/Ebbwire/Scheduled/Role/DefaultPolicy");
    expect(found).toMatch(
      /AwsSolutions-IAM5\[Resource::<EbbwireStore\w+\.Arn>\/\*\] Test\/Ebbwire\/Scheduled/,
    );
  });
});
