import { execFile } from "node:child_process";
import { cp, mkdir, readdir, readFile, symlink } from "node:fs/promises";
import { isBuiltin } from "node:module";
import { join, resolve } from "node:path";
import { promisify } from "node:util";
import { build } from "esbuild";
import { describe, expect, it } from "vitest";
import { temporaryFolder } from "../support/temporaryFolder.ts";

const run = promisify(execFile);
const cdk = resolve("node_modules/aws-cdk/bin/cdk");

// No way out: the toolkit and the SDK find no credentials and a proxy where nobody listens.
const offline = {
  PATH: process.env.PATH,
  HOME: "/nonexistent",
  HTTPS_PROXY: "http://127.0.0.1:9",
  HTTP_PROXY: "http://127.0.0.1:9",
  AWS_EC2_METADATA_DISABLED: "true",
};

async function synth(folder: string, output: string, ...more: string[]) {
  const arguments_ = [cdk, "synth", "--quiet", "--output", output, ...more];
  return run(process.execPath, arguments_, { cwd: folder, env: offline });
}

const template = async (output: string) => readFile(join(output, "Ebbwire.template.json"), "utf8");

/** The project's own files in a new folder, with the packages linked. */
async function copyOfProject(from: string, ...path: string[]): Promise<string> {
  const folder = join(await temporaryFolder(), ...path);
  await mkdir(folder, { recursive: true });
  for (const part of [
    "infra",
    "functions",
    "lib",
    "cdk.json",
    "package.json",
    "package-lock.json",
    "tsconfig.json",
  ])
    await cp(join(from, part), join(folder, part), { recursive: true });
  await symlink(resolve("node_modules"), join(folder, "node_modules"));
  return folder;
}

describe("npx cdk synth", { timeout: 300_000 }, () => {
  it("works offline and gives the same template twice, and from two folders", async () => {
    const outputs = await temporaryFolder();
    const [first, second, third] = ["first", "deeper/second", "third"].map((name) => join(outputs, name));
    const folder = await copyOfProject(".", "one");
    await synth(folder, first);
    await synth(folder, second);
    await synth(await copyOfProject(folder, "another", "deeper", "name"), third);
    const text = await template(first);
    expect(JSON.parse(text).Resources).toBeTruthy();
    expect(await template(second)).toBe(text);
    expect(await template(third)).toBe(text);
  });

  it("makes one ESM file a function, with nothing to install beside it", async () => {
    const output = join(await temporaryFolder(), "out");
    await synth(".", output);
    const assets = (await readdir(output)).filter((name) => name.startsWith("asset."));
    expect(assets).toHaveLength(3);
    for (const asset of assets) {
      // Beside it only what few runs ask for, each as one file that is loaded then.
      const beside = ["@aws-sdk/client-secrets-manager", "@aws-sdk/client-sfn", "date-holidays", "hyparquet"];
      const files = (await readdir(join(output, asset), { recursive: true })).sort();
      expect(files.filter((name) => /\.[a-z]+$/.test(name))).toEqual([
        "index.mjs",
        ...beside.flatMap((name) => [`node_modules/${name}/index.js`, `node_modules/${name}/package.json`]),
      ]);
      const { metafile } = await build({
        entryPoints: [join(output, asset, "index.mjs")],
        bundle: true,
        platform: "node",
        format: "esm",
        packages: "external",
        write: false,
        metafile: true,
        logLevel: "silent",
      });
      const imports = Object.values(metafile.outputs).flatMap((one) => one.imports);
      const outside = imports.filter(({ path }) => !isBuiltin(path));
      // The SDK offers to load a native signer for multi-region buckets where one is installed.
      for (const { path, kind } of outside)
        expect(`${kind} ${path}`).toMatch(
          /^(require-call|dynamic-import) (@aws-sdk\/(signature-v4-crt|client-secrets-manager|client-sfn)|date-holidays|hyparquet)$/,
        );
      expect(imports.length).toBeGreaterThan(outside.length);
    }
  });

  it("ends with a sentence, not a stack trace, when a choice is wrong", async () => {
    const output = join(await temporaryFolder(), "out");
    const failed = await synth(".", output, "-c", "ebbwire:timeZone=Mars/Base").catch((error) => error);
    expect(failed.stderr).toContain("ebbwire:timeZone must be an IANA time zone");
    expect(failed.stderr).not.toContain("    at ");
  });
});
