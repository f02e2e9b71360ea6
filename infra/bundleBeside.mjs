// Puts packages that few runs need beside a bundle, each as one file in `node_modules`, loaded when it is asked for:
// so the public holidays of every country (1.4 MB),
// and the clients of services that a cold start does not need.
// NodejsFunction starts this after bundling: node bundleBeside.mjs FOLDER PACKAGE...
import { mkdir, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { build } from "esbuild";

const [outputFolder, ...names] = process.argv.slice(2);
// As in the bundles themselves: Lambda gives credentials in the environment.
const lambdaCredentials = join(import.meta.dirname, "..", "functions", "cloud", "lambdaCredentials.ts");
for (const name of names) {
  const folder = join(outputFolder, "node_modules", name);
  await mkdir(folder, { recursive: true });
  await build({
    stdin: {
      contents: `export * from "${name}"; import * as all from "${name}"; export default all.default;`,
      resolveDir: import.meta.dirname,
    },
    bundle: true,
    platform: "node",
    format: "esm",
    target: "node24",
    mainFields: ["module", "main"],
    minify: true,
    alias: { "@aws-sdk/credential-provider-node": lambdaCredentials },
    legalComments: "none",
    banner: {
      js: "import { createRequire as requireMaker } from 'node:module'; const require = requireMaker(import.meta.url);",
    },
    outfile: join(folder, "index.js"),
    // Not every package has a default.
    logOverride: { "import-is-undefined": "silent" },
    logLevel: "warning",
  });
  await writeFile(
    join(folder, "package.json"),
    `${JSON.stringify({ name, type: "module", exports: "./index.js" })}\n`,
  );
}
