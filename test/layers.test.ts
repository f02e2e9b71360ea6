import { readdirSync, readFileSync } from "node:fs";
import { dirname, join, relative, resolve } from "node:path";
import { describe, expect, it } from "vitest";

// Which room may import which, DEVELOPERS.md "Rooms". A room may always import itself.
const mayImport: Record<string, readonly string[]> = {
  "lib/numeric": [],
  "lib/series": [],
  "lib/store": [],
  "lib/webhook": [],
  "lib/autoregression": ["lib/numeric"],
  "lib/dynamics": ["lib/numeric", "lib/autoregression"],
  "lib/forecast": ["lib/numeric", "lib/autoregression", "lib/dynamics", "lib/series"],
  "lib/drift": ["lib/numeric", "lib/autoregression", "lib/dynamics", "lib/series", "lib/forecast"],
  "lib/words": ["lib/series", "lib/forecast", "lib/drift"],
  "lib/report": ["lib/series", "lib/forecast", "lib/drift", "lib/words"],
  "lib/job": [
    "lib/numeric",
    "lib/series",
    "lib/autoregression",
    "lib/dynamics",
    "lib/forecast",
    "lib/drift",
    "lib/words",
    "lib/report",
    "lib/store",
    "lib/webhook",
  ],
  functions: ["lib/job", "lib/store", "lib/webhook", "lib/words", "lib/series", "events"],
  infra: ["lib/job/settings.ts"],
};
// Rooms that work on numbers or facts alone: no file, network or clock module may be reached from them.
const withoutInputOutput = ["numeric", "autoregression", "dynamics", "forecast", "drift", "words", "report"];

interface Import {
  readonly from: string;
  readonly to: string;
  readonly typeOnly: boolean;
}

function importsUnder(folder: string): Import[] {
  const files = readdirSync(folder, { recursive: true, encoding: "utf8" }).filter((name) =>
    name.endsWith(".ts"),
  );
  return files.flatMap((name) => {
    const from = join(folder, name);
    const statements = readFileSync(from, "utf8").matchAll(
      /^\s*(?:import|export)\s+(type\s)?[^"';]*?from\s+"([^"]+)"|^\s*import\s+"([^"]+)"|\bimport\("([^"]+)"\)/gm,
    );
    return [...statements].map((match) => ({
      from,
      to: match[2] ?? match[3] ?? match[4],
      typeOnly: match[1] !== undefined,
    }));
  });
}

const roomOf = (path: string) =>
  path.startsWith("lib/") ? path.split("/").slice(0, 2).join("/") : path.split("/")[0];
const all = ["lib", "functions", "infra"].flatMap(importsUnder);

describe("rooms", () => {
  it("import only downwards", () => {
    const upward = all.flatMap(({ from, to }) => {
      if (!to.startsWith(".") || from === "lib/index.ts") return [];
      const target = relative(process.cwd(), resolve(dirname(from), to));
      const room = roomOf(from);
      const allowed = room === roomOf(target) || mayImport[room]?.some((one) => target.startsWith(one));
      return allowed ? [] : [`${from} imports ${target}`];
    });
    expect(upward).toEqual([]);
    expect(all.length).toBeGreaterThan(50); // the search itself found something
  });

  it("take only types of the numbers into words and report", () => {
    const live = all.filter(
      ({ from, to, typeOnly }) =>
        /^lib\/(words|report)\//.test(from) && /\/(forecast|drift)\//.test(to) && !typeOnly,
    );
    expect(live).toEqual([]);
  });

  it("keep files, network and clock out of the rooms of numbers and words", () => {
    const reaching = all.filter(
      ({ from, to }) =>
        withoutInputOutput.includes(from.split("/")[1]) && from.startsWith("lib/") && to.startsWith("node:"),
    );
    expect(reaching).toEqual([]);
    const files = withoutInputOutput.flatMap((room) =>
      readdirSync(join("lib", room), { recursive: true, encoding: "utf8" }).map((name) =>
        join("lib", room, name),
      ),
    );
    const clocked = files.filter(
      (file) =>
        file.endsWith(".ts") &&
        /Math\.random\(|Date\.now\(|new Date\(\)|process\.env/.test(readFileSync(file, "utf8")),
    );
    expect(clocked).toEqual([]);
  });
});
