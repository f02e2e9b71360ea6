import { writeFileSync } from "node:fs";
import { parseArgs } from "node:util";
import { accuracyBench } from "./accuracyBench.ts";
import type { BenchRow } from "./benchRow.ts";
import { bundleBench } from "./bundleBench.ts";
import { coreBench } from "./coreBench.ts";
import { costBench } from "./costBench.ts";
import { driftBench } from "./driftBench.ts";
import { jobBench } from "./jobBench.ts";
import { largeBench } from "./largeBench.ts";
import { makeBoundaries } from "./makeBoundaries.ts";
import { readingBench } from "./readingBench.ts";

/** Each part of the bench by the name it is asked for. */
const PARTS: Record<string, (data: string | undefined) => Promise<BenchRow[]>> = {
  accuracy: accuracyBench,
  bundles: bundleBench,
  core: coreBench,
  cost: costBench,
  drift: driftBench,
  job: jobBench,
  reading: readingBench,
};

/**
 * Run only when asked for by name: a hundred thousand series (or as many as `--data` says), and the table of the monitor's
 * boundaries made anew, into the file of `--data`.
 */
const ON_REQUEST: typeof PARTS = {
  large: (count) => largeBench(count === undefined ? undefined : Number(count)),
  "drift-boundaries": async (file = "boundaries.json") => {
    makeBoundaries(file);
    return [];
  },
};

/**
 * `npm run bench -- [core | accuracy | bundles | cost | drift | reading | job | large] [--data FILE] [--json FILE]`: runs
 * one part, or all but the large one, and prints a table of what was measured, against what, and the goal.
 */
async function main(): Promise<void> {
  const { values: options, positionals } = parseArgs({
    options: { json: { type: "string" }, data: { type: "string" } },
    allowPositionals: true,
  });
  const asked = positionals.length > 0 ? positionals : Object.keys(PARTS);
  const rows: BenchRow[] = [];
  for (const name of asked) {
    const part = PARTS[name] ?? ON_REQUEST[name];
    if (part === undefined) {
      console.error(`no bench part is called ${name}; there are ${Object.keys(PARTS).join(", ")}`);
      process.exitCode = 2;
      return;
    }
    console.log(`\n${name}`);
    const found = await part(options.data);
    console.log(found.map(line).join("\n"));
    rows.push(...found);
  }
  if (options.json !== undefined) writeFileSync(options.json, `${JSON.stringify(rows, null, 2)}\n`);
}

function line(row: BenchRow): string {
  const ratio = Number.isNaN(row.ratio) ? "" : `  ratio ${format(row.ratio)}`;
  const against = row.against === "" ? "" : `  against ${row.against}`;
  const goal = row.goal === "" ? "" : `  (goal: ${row.goal})`;
  return `  ${row.name}: ${format(row.value)} ${row.unit}${against}${ratio}${goal}`;
}

function format(value: number): string {
  return Math.abs(value) >= 1e4 ? value.toFixed(0) : String(Number(value.toPrecision(4)));
}

await main();
