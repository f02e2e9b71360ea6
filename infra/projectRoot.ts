import { existsSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";

/**
 * The folder that holds this project's functions, wherever the app that uses the construct was bundled to and
 * whatever folder it is run from: sought upwards from this file, then upwards from the working folder, in each
 * place also as the installed package `node_modules/ebbwire`.
 *
 * @throws {Error} when it is found nowhere, naming the property that tells it
 */
export function projectRoot(from = fileURLToPath(import.meta.url), workingFolder = process.cwd()): string {
  for (const start of [dirname(from), workingFolder]) {
    for (let folder = start; ; folder = dirname(folder)) {
      for (const candidate of [folder, join(folder, "node_modules", "ebbwire")])
        if (isProject(candidate)) return candidate;
      if (dirname(folder) === folder) break;
    }
  }
  throw new Error(
    `the ebbwire project was found neither above ${from} nor above ${workingFolder}; give its folder as projectRoot`,
  );
}

function isProject(folder: string): boolean {
  const file = join(folder, "package.json");
  if (!existsSync(file) || !existsSync(join(folder, "functions", "scheduled.ts"))) return false;
  try {
    return JSON.parse(readFileSync(file, "utf8")).name === "ebbwire";
  } catch {
    return false;
  }
}
