import { readFileSync } from "node:fs";
import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { App } from "aws-cdk-lib";
import { Template } from "aws-cdk-lib/assertions";
import { EbbwireStack } from "../../infra/ebbwireStack.ts";

export type FunctionName = "Scheduled" | "Portion" | "Closing";

export interface Bundles {
  readonly template: Template;
  /** The folder that is uploaded for each function. */
  readonly folders: Readonly<Record<FunctionName, string>>;
  readonly remove: () => Promise<void>;
}

/** Synthesises the deployment, bundling included, and tells where the code of each function lies. */
export async function functionBundles(choices = {}): Promise<Bundles> {
  const outdir = await mkdtemp(join(tmpdir(), "ebbwire-bundles-"));
  const { context } = JSON.parse(readFileSync("cdk.json", "utf8"));
  const app = new App({ outdir, context: { ...context, "aws:cdk:enable-asset-metadata": true } });
  const template = Template.fromStack(new EbbwireStack(app, "Bundled", { choices }));
  const folders = Object.fromEntries(
    Object.entries(template.findResources("AWS::Lambda::Function")).map(([id, { Metadata }]) => [
      /^Ebbwire(\w+?)Function/.exec(id)?.[1],
      join(outdir, Metadata["aws:asset:path"]),
    ]),
  ) as Record<FunctionName, string>;
  return { template, folders, remove: () => rm(outdir, { recursive: true, force: true }) };
}
