import { Stack, Validations } from "aws-cdk-lib";
import type { IConstruct } from "constructs";

/**
 * Acknowledges, one by one and with a reason, the wildcards in resources that a rule pack (cdk-nag's
 * AwsSolutions-IAM5) finds below `scope`. A wildcard nobody acknowledged here stays a finding.
 */
export function acknowledgeWildcards(scope: IConstruct, resources: readonly string[], reason: string): void {
  const stack = Stack.of(scope);
  const found = new Set(resources.map((resource) => flat(stack.resolve(resource))));
  for (const resource of found)
    if (resource.includes("*"))
      Validations.of(scope).acknowledge({ id: `AwsSolutions-IAM5[Resource::${resource}]`, reason });
}

/** A CloudFormation reference as the rule pack writes it: `<Logical.Attribute>/rest`. */
function flat(value: unknown): string {
  if (typeof value === "string") return value.replaceAll("${", "<").replaceAll("}", ">");
  const node = value as Readonly<Record<string, unknown>>;
  if (node["Fn::Join"] !== undefined) {
    const [delimiter, items] = node["Fn::Join"] as [string, unknown[]];
    return items.map(flat).join(delimiter);
  }
  if (node["Fn::GetAtt"] !== undefined) return `<${(node["Fn::GetAtt"] as string[]).join(".")}>`;
  if (node.Ref !== undefined) return `<${String(node.Ref)}>`;
  return JSON.stringify(value);
}
