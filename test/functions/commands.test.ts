import { execFile } from "node:child_process";
import { mkdir, readdir, readFile, rm, writeFile } from "node:fs/promises";
import { join } from "node:path";
import { promisify } from "node:util";
import { buildSync } from "esbuild";
import { beforeAll, describe, expect, it } from "vitest";
import { smallTables } from "../support/jobStores.ts";
import { temporaryFolder } from "../support/temporaryFolder.ts";

const bundle = "dist/test/local.js";
beforeAll(() => {
  buildSync({
    entryPoints: ["functions/local.ts", "functions/tableWorker.ts"],
    bundle: true,
    platform: "node",
    format: "esm",
    packages: "external",
    outdir: "dist/test",
  });
});

interface Ended {
  readonly code: number;
  readonly stdout: string;
  readonly stderr: string;
}

async function command(...words: string[]): Promise<Ended> {
  try {
    return { code: 0, ...(await promisify(execFile)("node", [bundle, ...words])) };
  } catch (error) {
    return error as Ended;
  }
}

async function smallStore(): Promise<string> {
  const folder = await temporaryFolder();
  for (const [key, text] of Object.entries(smallTables())) {
    await mkdir(join(folder, key, ".."), { recursive: true });
    await writeFile(join(folder, key), text);
  }
  return folder;
}

describe("the command line", () => {
  it.each([
    [["frob"], /no command "frob"/],
    [["run"], /--store/],
    [["run", "--store", "x", "--as-of", "yesterday"], /--as-of.*yesterday/],
    [
      ["replay", "--store", "x", "--from", "2026-01-05T06:00:00Z", "--every", "fortnight"],
      /--every.*fortnight/,
    ],
    [["replay", "--store", "x"], /--from/],
    [["explain", "--store", "x"], /name of a table/],
    [["run", "--frob"], /--frob/],
    [["run", "--store", "ftp://x"], /ftp/],
    [
      ["run", "--store", "x", "--from", "2026-01-05T06:00:00Z", "--every", "month", "--json"],
      /^--from belongs to replay, not to run\n--every belongs to replay, not to run\n--json belongs to check and explain, not to run\n/,
    ],
    [["check", "--store", "x", "--workers", "2"], /^--workers belongs to run, not to check\n/],
    [
      ["replay", "--store", "x", "--as-of", "now"],
      /^--as-of belongs to run, check and explain, not to replay\n/,
    ],
    [["--store", "x"], /^--store belongs to run, replay, check and explain, not to the demo, which/],
    [["explain", "sales", "Bahnhof", "extra", "--store", "x"], /"extra" is one word too many/],
    [["run", "x"], /^run takes options alone: "x" is one word too many/],
  ])("refuses %j with exit code 2 and says what is wrong", async (words, expected) => {
    const { code, stderr } = await command(...words);
    expect(code).toBe(2);
    expect(stderr).toMatch(expected);
    expect(stderr).not.toMatch(/\bat .*\.js:\d/); // no stack trace
  });

  it("runs, explains in words and JSON, and ends with 1 when a table failed", async () => {
    const store = await smallStore();
    const run = await command("run", "--store", store, "--as-of", "2026-11-30T06:00:00Z");
    expect(run.code).toBe(0);
    expect(run.stdout).toMatch(/3 tables, 4 series/);
    const explained = await command("explain", "weekly", "East", "--store", store);
    expect(explained.code).toBe(0);
    expect(explained.stdout).toMatch(/half-life/i);
    const json = JSON.parse((await command("explain", "weekly", "East", "--store", store, "--json")).stdout);
    expect(json).toMatchObject({
      table: "weekly",
      asOf: "2026-11-30T06:00:00Z",
      series: [{ series: "East" }],
    });
    await writeFile(join(store, "series/bad.csv"), "");
    const failing = await command("run", "--store", store, "--as-of", "2026-12-01T06:00:00Z");
    expect(failing.code).toBe(1);
    expect(failing.stdout).toMatch(/failed: bad/);
  });

  it("gives the same forecasts on two threads as on one", async () => {
    const stores = [await smallStore(), await smallStore()];
    for (const [index, store] of stores.entries()) {
      const run = await command(
        "run",
        "--store",
        store,
        "--as-of",
        "2026-11-30T06:00:00Z",
        "--workers",
        `${index + 1}`,
      );
      expect(run.code).toBe(0);
    }
    for (const table of ["weekly", "monthly", "north/daily"]) {
      const [one, two] = await Promise.all(
        stores.map((store) => readFile(join(store, `models/${table}/2026-11-30T06-00-00Z.json`), "utf8")),
      );
      expect(two).toBe(one);
    }
  });

  it("checks without writing a byte", async () => {
    const store = await smallStore();
    const { code, stdout } = await command("check", "--store", store, "--as-of", "2026-11-30T06:00:00Z");
    expect(code).toBe(0);
    expect(stdout).toMatch(/weekly/);
    expect((await command("explain", "weekly", "--store", store)).stderr).toMatch(/run first/);
    const misspelt = await command("explain", "weakly", "East", "--store", store);
    expect(misspelt.code).toBe(2);
    expect(misspelt.stderr).toMatch(/^there is no table "weakly" in .*: did you mean "weekly"\?\n/);
  });

  it("says what check says of a store without a table, ends with 2 and writes nothing", async () => {
    const store = await temporaryFolder();
    const checked = await command("check", "--store", store);
    expect(checked.stdout).toMatch(/^There are no tables in .* yet: put CSV files under series\//);
    const replay = ["replay", "--store", store, "--from", "2026-11-30T06:00:00Z"];
    for (const words of [["run", "--store", store], replay]) {
      const { code, stdout, stderr } = await command(...words);
      expect(code).toBe(2);
      expect(stderr).toContain(checked.stdout);
      expect(stdout).toBe("");
    }
    expect(await readdir(store)).toEqual([]);
  });

  it("names the tables that are gone, and ends with 2 where none is left", async () => {
    const store = await smallStore();
    await command("run", "--store", store, "--as-of", "2026-11-30T06:00:00Z");
    await rm(join(store, "series/monthly.csv"));
    const fewer = await command("run", "--store", store, "--as-of", "2026-12-01T06:00:00Z");
    expect(fewer.stdout).toMatch(/^not there any more: monthly$/m);
    expect(fewer.code).toBe(0);
    await rm(join(store, "series"), { recursive: true });
    const none = await command("run", "--store", store, "--as-of", "2026-12-02T06:00:00Z");
    expect(none.stdout).toMatch(/0 tables: 2 tables gone since the last run/);
    expect(none.code).toBe(2);
  });

  it("ends with 2 on settings that cannot be used, every problem at once, nothing written", async () => {
    const store = await smallStore();
    await writeFile(join(store, "settings.json"), '{ "horizont": 8, "levels": [80, 950] }');
    const { code, stderr } = await command("run", "--store", store);
    expect(code).toBe(2);
    expect(stderr).toMatch(/horizont/);
    expect(stderr).toMatch(/horizon\b/);
    expect(stderr).toMatch(/levels/);
  });
});
