import type { Template } from "aws-cdk-lib/assertions";

/** One Allow statement with its references written out as text: `<Logical.Arn>/series/*`. */
export interface Statement {
  readonly actions: readonly string[];
  readonly resources: readonly string[];
  // biome-ignore lint/suspicious/noExplicitAny: conditions nest freely
  readonly conditions: any;
}

// biome-ignore lint/suspicious/noExplicitAny: templates are looked into freely
type Json = any;

/** Writes a CloudFormation reference as text. */
export function textOf(value: Json): string {
  if (typeof value === "string") return value;
  if (value["Fn::Join"]) return value["Fn::Join"][1].map(textOf).join(value["Fn::Join"][0]);
  if (value["Fn::GetAtt"]) return `<${value["Fn::GetAtt"].join(".")}>`;
  if (value.Ref) return `<${value.Ref}>`;
  throw new Error(`no text for ${JSON.stringify(value)}`);
}

const listOf = (value: Json): Json[] => (Array.isArray(value) ? value : [value]);

function statementsOf(document: Json): Statement[] {
  return document.Statement.filter(({ Effect }: Json) => Effect === "Allow").map((one: Json) => ({
    actions: listOf(one.Action),
    resources: listOf(one.Resource).map(textOf),
    conditions: one.Condition ?? {},
  }));
}

/** Everything each role of a template may do, by the role's logical id. */
export function policiesOf(template: Template): Record<string, Statement[]> {
  const all: Record<string, Statement[]> = {};
  for (const [id, role] of Object.entries<Json>(template.findResources("AWS::IAM::Role")))
    all[id] = listOf(role.Properties.Policies ?? []).flatMap((one) => statementsOf(one.PolicyDocument));
  for (const policy of Object.values<Json>(template.findResources("AWS::IAM::Policy")))
    for (const { Ref } of policy.Properties.Roles)
      all[Ref].push(...statementsOf(policy.Properties.PolicyDocument));
  return all;
}
