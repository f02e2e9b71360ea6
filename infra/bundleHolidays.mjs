// Puts the package date-holidays beside a bundle, as one file in `node_modules`: 1.4 MB of every country's rules that
// only a run whose settings name holidays loads. NodejsFunction starts this after bundling: node bundleHolidays.mjs FOLDER
import { mkdir, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { build } from "esbuild";

const folder = join(process.argv[2], "node_modules", "date-holidays");
await mkdir(folder, { recursive: true });
await build({
  stdin: { contents: 'export { default } from "date-holidays";', resolveDir: import.meta.dirname },
  bundle: true,
  platform: "node",
  format: "esm",
  target: "node24",
  mainFields: ["module", "main"],
  minify: true,
  legalComments: "none",
  banner: {
    js: "import { createRequire as requireMaker } from 'node:module'; const require = requireMaker(import.meta.url);",
  },
  outfile: join(folder, "index.js"),
  logLevel: "warning",
});
await writeFile(
  join(folder, "package.json"),
  '{"name":"date-holidays","type":"module","exports":"./index.js"}\n',
);
