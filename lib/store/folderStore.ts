import type { FileHandle } from "node:fs/promises";
import { link, mkdir, open, rename, stat, writeFile } from "node:fs/promises";
import { dirname, join } from "node:path";
import { fileVersion, listFolder, undefinedWhenAbsent } from "./folderListing.ts";
import { keyFault, prefixFault } from "./key.ts";
import type { ObjectEntry, ObjectStore, StoredObject } from "./objectStore.ts";
import { StoreError } from "./objectStore.ts";
import { removeTemporary, sweepTemporary, writeTemporary } from "./temporaryFile.ts";

/** How often a step is tried again when another process got in between. */
const tries = 5;
/** What systems without hard links (exFAT, some network drives) answer to `link`. */
const noLinks = new Set(["EPERM", "ENOTSUP", "EOPNOTSUPP", "ENOSYS", "EXDEV"]);

/**
 * A store in a folder of the local disk; it is made on the first write.
 *
 * A new object is first written whole to a hidden file and flushed, then given its name by `link` (which
 * fails when the name is taken: create) or `rename` (which replaces: write). So no reader ever sees half an
 * object, of two writers one wins, and a crash leaves at most a hidden file, which later writers remove.
 * On a disk without hard links `create` falls back to opening the name exclusively, where a crash within
 * the one write can leave it incomplete.
 */
export class FolderStore implements ObjectStore {
  readonly address: string;
  readonly #root: string;
  #swept = false;

  constructor(path: string) {
    this.address = path;
    this.#root = path;
  }

  async read(key: string): Promise<StoredObject | undefined> {
    return this.#guard("read", key, async (path) => {
      const file = await this.#open(path);
      if (file === undefined) return undefined;
      try {
        return await readWhole(file);
      } finally {
        await file.close();
      }
    });
  }

  async stream(key: string): Promise<AsyncIterable<Uint8Array> | undefined> {
    return this.#guard("read", key, async (path) => {
      const file = await this.#open(path);
      return file === undefined ? undefined : this.#pieces(key, file);
    });
  }

  async create(key: string, bytes: Uint8Array): Promise<"created" | "exists"> {
    return this.#guard("create", key, async (path) => {
      await this.#sweepOnce();
      // Spares the writing of what cannot win; `link` still decides.
      if (await exists(path)) return "exists";
      return this.#place(path, bytes, async (temporary) => {
        try {
          await link(temporary, path);
          return "created";
        } catch (error) {
          const code = (error as NodeJS.ErrnoException).code ?? "";
          if (code === "EEXIST") return (await linkedAfterAll(temporary, path)) ? "created" : "exists";
          if (noLinks.has(code)) return createInPlace(path, bytes);
          throw error;
        }
      });
    });
  }

  async write(key: string, bytes: Uint8Array): Promise<void> {
    await this.#guard("write", key, async (path) => {
      await this.#sweepOnce();
      await this.#place(path, bytes, (temporary) => rename(temporary, path));
    });
  }

  async list(prefix: string): Promise<ObjectEntry[]> {
    return this.#guard("list", prefix, async () => {
      await this.#requireRoot();
      return listFolder(this.#root, prefix);
    });
  }

  /** Writes a hidden file and lets `settle` give it its name; done again when it was taken away meanwhile. */
  async #place<T>(path: string, bytes: Uint8Array, settle: (temporary: string) => Promise<T>): Promise<T> {
    for (let attempt = 1; ; attempt++) {
      const temporary = await writeTemporary(this.#root, bytes);
      try {
        await mkdir(dirname(path), { recursive: true });
        const result = await settle(temporary);
        await flushFolder(dirname(path));
        return result;
      } catch (error) {
        if ((error as NodeJS.ErrnoException).code !== "ENOENT" || attempt === tries) throw error;
      } finally {
        await removeTemporary(temporary);
      }
    }
  }

  async #sweepOnce(): Promise<void> {
    if (this.#swept) return;
    this.#swept = true;
    await sweepTemporary(this.#root);
  }

  /** Opens for reading; `undefined` where no object stands. */
  async #open(path: string): Promise<FileHandle | undefined> {
    const file = await open(path, "r").catch(undefinedWhenAbsent);
    if (file === undefined) {
      await this.#requireRoot();
      return undefined;
    }
    if ((await file.stat()).isFile()) return file;
    await file.close();
    return undefined;
  }

  async #requireRoot(): Promise<void> {
    const found = await stat(this.#root).catch(undefinedWhenAbsent);
    if (!found?.isDirectory()) throw new Error("there is no such folder");
  }

  async *#pieces(key: string, file: FileHandle): AsyncIterable<Uint8Array> {
    try {
      // The stream closes the file, also when the reader stops early.
      for await (const piece of file.createReadStream()) yield piece as Uint8Array;
    } catch (error) {
      throw new StoreError(this.address, "read", key, error);
    }
  }

  async #guard<T>(action: StoreError["action"], key: string, work: (path: string) => Promise<T>): Promise<T> {
    try {
      const fault = action === "list" ? prefixFault(key) : keyFault(key);
      if (fault !== undefined) throw new Error(fault);
      return await work(join(this.#root, key));
    } catch (error) {
      throw error instanceof StoreError ? error : new StoreError(this.address, action, key, error);
    }
  }
}

/** The bytes with the version they belong to: read again when the file changed under the reader. */
async function readWhole(file: FileHandle): Promise<StoredObject> {
  for (let attempt = 0; attempt < tries; attempt++) {
    const before = await file.stat({ bigint: true });
    const bytes = new Uint8Array(Number(before.size));
    let filled = 0;
    while (filled < bytes.length) {
      const { bytesRead } = await file.read(bytes, filled, bytes.length - filled, filled);
      if (bytesRead === 0) break;
      filled += bytesRead;
    }
    const version = fileVersion(before);
    if (filled === bytes.length && fileVersion(await file.stat({ bigint: true })) === version) {
      return { bytes, version };
    }
  }
  throw new Error("the file keeps changing while it is read");
}

async function exists(path: string): Promise<boolean> {
  const found = await stat(path).catch(undefinedWhenAbsent);
  if (found?.isDirectory()) throw new Error("a folder stands where the object should be");
  return found !== undefined;
}

/** Network file systems may carry out a `link` and lose the answer: then both names show one file. */
async function linkedAfterAll(temporary: string, path: string): Promise<boolean> {
  const [own, standing] = await Promise.all([
    stat(temporary, { bigint: true }).catch(undefinedWhenAbsent),
    stat(path, { bigint: true }).catch(undefinedWhenAbsent),
  ]);
  return own !== undefined && own.ino === standing?.ino && own.dev === standing.dev;
}

async function createInPlace(path: string, bytes: Uint8Array): Promise<"created" | "exists"> {
  try {
    await writeFile(path, bytes, { flag: "wx" });
    return "created";
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === "EEXIST") return "exists";
    throw error;
  }
}

/** Makes the new name itself survive a power cut; systems that cannot flush a folder are let be. */
async function flushFolder(path: string): Promise<void> {
  const folder = await open(path, "r").catch(() => undefined);
  await folder?.sync().catch(() => undefined);
  await folder?.close();
}
