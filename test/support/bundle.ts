import { mkdtemp, rm } from "node:fs/promises";
import { join, resolve } from "node:path";
import { build } from "esbuild";
import { onTestFinished } from "vitest";

/**
 * Bundles a TypeScript file of this project so that Node can run it by itself in a child process, which every
 * supported Node can; packages stay outside and are found from the project. Removed when the test ends.
 */
export async function bundle(entry: string, folder?: string): Promise<string> {
  const into = folder ?? (await mkdtemp(resolve("node_modules", ".bundle-")));
  if (folder === undefined) onTestFinished(() => rm(into, { recursive: true, force: true }));
  await build({
    entryPoints: { bundle: entry },
    bundle: true,
    platform: "node",
    format: "esm",
    target: "node20",
    packages: "external",
    splitting: true,
    outdir: into,
    outExtension: { ".js": ".mjs" },
    logLevel: "warning",
  });
  return join(into, "bundle.mjs");
}
