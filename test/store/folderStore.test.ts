import { execFile, spawn } from "node:child_process";
import { existsSync } from "node:fs";
import { mkdir, readdir, readFile, rename, rm, stat, symlink, utimes, writeFile } from "node:fs/promises";
import { hostname } from "node:os";
import { join } from "node:path";
import { promisify } from "node:util";
import { describe, expect, it } from "vitest";
import { FolderStore } from "../../lib/store/folderStore.ts";
import { bundle } from "../support/bundle.ts";
import { seeded } from "../support/faultProxy.ts";
import { temporaryFolder } from "../support/temporaryFolder.ts";
import { storeContract } from "./contract.ts";

storeContract("a folder", async () => new FolderStore(join(await temporaryFolder(), "store")));

const keys = async (store: FolderStore) => (await store.list("")).map(({ key }) => key);

describe("a folder store", () => {
  it("says that there is no such folder, instead of finding nothing in it", async () => {
    const folder = join(await temporaryFolder(), "mistyped");
    const store = new FolderStore(folder);
    const said = `in ${folder}: there is no such folder`;
    await expect(store.list("series/")).rejects.toThrow(`could not list "series/" ${said}`);
    await expect(store.read("settings.json")).rejects.toThrow(`could not read "settings.json" ${said}`);
    await expect(store.stream("series/a.csv")).rejects.toThrow(said);
  });

  it("makes its folder at the first write, and leaves only what was written in sight", async () => {
    const folder = join(await temporaryFolder(), "a", "b");
    const store = new FolderStore(folder);
    await store.create("models/x/1.json", Buffer.from("{}"));
    await store.write("settings.json", Buffer.from("{}"));
    expect((await readdir(folder)).sort()).toEqual([".unfinished", "models", "settings.json"]);
    expect(await readdir(join(folder, ".unfinished"))).toEqual([]);
  });

  it("lists no hidden file, no folder, and nothing twice through a loop of links", async () => {
    const folder = await temporaryFolder();
    const store = new FolderStore(folder);
    await store.write("series/a.csv", Buffer.from("a"));
    await writeFile(join(folder, "series", ".DS_Store"), "x");
    await writeFile(join(folder, "series", "._a.csv"), "x");
    await mkdir(join(folder, "series", "empty"));
    await symlink("..", join(folder, "series", "loop"));
    await symlink("nowhere", join(folder, "series", "broken.csv"));
    await symlink("a.csv", join(folder, "series", "linked.csv"));
    expect(await keys(store)).toEqual(["series/a.csv", "series/linked.csv"]);
  });

  it("a folder is no object, and where one stands no object can be put", async () => {
    const store = new FolderStore(await temporaryFolder());
    await store.write("series/a.csv", Buffer.from("a"));
    expect(await store.read("series")).toBeUndefined();
    expect(await store.stream("series")).toBeUndefined();
    await expect(store.create("series", Buffer.from("x"))).rejects.toThrow("a folder stands where");
    await expect(store.write("series", Buffer.from("x"))).rejects.toThrow('could not write "series"');
    await expect(store.create("series/a.csv/b", Buffer.from("x"))).rejects.toThrow(
      'could not create "series/a.csv/b"',
    );
    expect(await keys(store)).toEqual(["series/a.csv"]);
    expect(await readdir(join(store.address, ".unfinished"))).toEqual([]);
  });

  it.skipIf(!existsSync("/proc/self/fd"))("leaves no file open, whatever it was asked", async () => {
    const store = new FolderStore(await temporaryFolder());
    await store.write("series/a.csv", Buffer.alloc(500_000));
    const openFiles = async () => (await readdir("/proc/self/fd")).length;
    const before = await openFiles();
    for (let i = 0; i < 30; i++) {
      await store.read("series/a.csv");
      await store.read("series");
      await store.stream("series");
      await store.read("series/absent.csv");
      await store.create("series/a.csv", Buffer.from("x"));
      await store.write(`series/${i}.csv`, Buffer.from("x"));
      for await (const _ of (await store.stream("series/a.csv"))!) break;
    }
    // A stream that was left closes its file a moment later.
    await expect.poll(openFiles).toBeLessThanOrEqual(before + 3);
  });

  it("the version changes when an editor changes a file in place or replaces it", async () => {
    const store = new FolderStore(await temporaryFolder());
    const path = join(store.address, "a.csv");
    const version = async () => (await store.read("a.csv"))!.version;
    await writeFile(path, "one");
    const versions = [await version()];
    await writeFile(path, "two");
    await utimes(path, 1e9, 1e9);
    versions.push(await version());
    await writeFile(path, "longer");
    await utimes(path, 1e9, 1e9);
    versions.push(await version());
    await writeFile(`${path}.new`, "replac");
    await utimes(`${path}.new`, 1e9, 1e9);
    await rename(`${path}.new`, path);
    versions.push(await version());
    expect(new Set(versions).size).toBe(4);
  });

  it("removes unfinished files whose process is gone or that are a day old, and no others", async () => {
    const store = new FolderStore(await temporaryFolder());
    const unfinished = join(store.address, ".unfinished");
    await mkdir(unfinished);
    const here = hostname().replace(/[^A-Za-z0-9-]/g, "-");
    const gone = spawn(process.execPath, ["-e", ""]);
    await new Promise((resolve) => gone.once("exit", resolve));
    const files = {
      [`${here}.${gone.pid}.0`]: "of a process that is gone",
      [`${here}.${process.pid}.999999`]: "of an earlier process with our number",
      [`${here}.${process.ppid}.0`]: "of a process that lives",
      "elsewhere.1.0": "of another machine, fresh",
      "elsewhere.1.1": "of another machine, old",
    };
    for (const [name, content] of Object.entries(files)) await writeFile(join(unfinished, name), content);
    const old = (await stat(unfinished)).mtimeMs / 1000 - 25 * 3600;
    await utimes(join(unfinished, "elsewhere.1.1"), old, old);
    await store.write("a.csv", Buffer.from("a"));
    expect((await readdir(unfinished)).sort()).toEqual(["elsewhere.1.0", `${here}.${process.ppid}.0`].sort());
  });

  it("finishes although its unfinished files are taken away again and again", async () => {
    const store = new FolderStore(await temporaryFolder());
    await store.write("0.csv", Buffer.from("a"));
    const unfinished = join(store.address, ".unfinished");
    let busy = true;
    let stolen = 0;
    const stealing = (async () => {
      for (; busy && stolen < 3; await new Promise((resolve) => setImmediate(resolve))) {
        for (const name of await readdir(unfinished)) {
          await rm(join(unfinished, name), { force: true });
          stolen++;
        }
      }
    })();
    for (let i = 1; i <= 40 || stolen < 3; i++) {
      expect(await store.create(`${i}.csv`, Buffer.alloc(200_000, "b"))).toBe("created");
      expect((await store.read(`${i}.csv`))!.bytes).toHaveLength(200_000);
    }
    busy = false;
    await stealing;
  });

  it("of eight processes that create the same fifty objects exactly one wins each", async () => {
    const folder = await temporaryFolder();
    const program = await bundle("test/store/storeChild.ts");
    const processes = Array.from({ length: 8 }, (_, i) =>
      promisify(execFile)(process.execPath, [program, folder, "create-race", `process ${i}`]),
    );
    const won = (await Promise.all(processes)).map(({ stdout }) => JSON.parse(stdout) as number[]);
    expect(won.flat().sort((a, b) => a - b)).toEqual(Array.from({ length: 50 }, (_, i) => i));
    for (const [process_, claims] of won.entries()) {
      for (const claim of claims) {
        expect(await readFile(join(folder, `claims/${claim}.json`), "utf8")).toBe(`process ${process_}`);
      }
    }
  });

  it("killed at thirty random moments, it leaves only whole objects, and the next writer clears the rest", async () => {
    const folder = await temporaryFolder();
    const program = await bundle("test/store/storeChild.ts");
    const next = seeded(7);
    for (let kill = 0; kill < 30; kill++) {
      const child = spawn(process.execPath, [program, folder, "write-forever", String(kill)]);
      await new Promise((resolve) => child.stdout.once("data", resolve));
      await new Promise((resolve) => setTimeout(resolve, next() * 40));
      child.kill("SIGKILL");
      await new Promise((resolve) => child.once("exit", resolve));
    }
    const store = new FolderStore(folder);
    const found = await store.list("");
    // Each process was killed after it had gone round once at least.
    expect(found.length).toBeGreaterThan(30);
    for (const { key } of found) {
      const { bytes } = (await store.read(key))!;
      expect(bytes.length, key).toBe(key === "latest.csv" ? 2_000_000 : 300_000);
      expect(
        bytes.every((byte) => byte === bytes[0]),
        key,
      ).toBe(true);
    }
    expect(
      await store.create(found.find(({ key }) => key.startsWith("history/"))!.key, Buffer.from("x")),
    ).toBe("exists");
    expect(await readdir(join(folder, ".unfinished"))).toEqual([]);
  }, 60_000);
});
