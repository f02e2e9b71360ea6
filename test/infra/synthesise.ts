import { readFileSync } from "node:fs";
import { App } from "aws-cdk-lib";
import { Template } from "aws-cdk-lib/assertions";
import type { EbbwireProps } from "../../infra/ebbwire.ts";
import { EbbwireStack } from "../../infra/ebbwireStack.ts";

/** An app with cdk.json's feature flags that leaves bundling out: templates are made in a second. */
export function testApp(context: Readonly<Record<string, unknown>> = {}): App {
  const flags = JSON.parse(readFileSync("cdk.json", "utf8")).context;
  return new App({ context: { ...flags, "aws:cdk:bundling-stacks": [], ...context } });
}

export interface Resource {
  readonly Type: string;
  // biome-ignore lint/suspicious/noExplicitAny: templates are looked into freely
  readonly Properties: any;
  readonly DeletionPolicy?: string;
  readonly UpdateReplacePolicy?: string;
}

export function stackOf(choices: EbbwireProps = {}): EbbwireStack {
  return new EbbwireStack(testApp(), "Test", { choices });
}

export const templateOf = (choices: EbbwireProps = {}) => Template.fromStack(stackOf(choices));

/** The resources of one type by logical id. */
export function resourcesOf(template: Template, type: string): [string, Resource][] {
  return Object.entries(template.findResources(type)) as [string, Resource][];
}
