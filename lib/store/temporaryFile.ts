import { mkdir, open, readdir, stat, unlink } from "node:fs/promises";
import { hostname } from "node:os";
import { basename, join } from "node:path";

/** Where unfinished files lie: below the store, so on the same disk; the dot keeps it out of listings. */
const temporaryFolder = ".unfinished";
/** Another machine's unfinished file is given up for lost after this long, by the clock of the disk. */
const lostAfterMilliseconds = 24 * 3600 * 1000;

const owner = hostname().replace(/[^A-Za-z0-9-]/g, "-");
const own = new Set<string>();
let count = 0;

/**
 * Writes the bytes to a new file below the store, flushes it to the disk and returns its path.
 * The name says who made it, `machine.process.number`; a name already taken moves on to the next number.
 */
export async function writeTemporary(root: string, bytes: Uint8Array): Promise<string> {
  const folder = join(root, temporaryFolder);
  await mkdir(folder, { recursive: true });
  for (;;) {
    const name = `${owner}.${process.pid}.${count++}`;
    const path = join(folder, name);
    const file = await open(path, "wx").catch((error: NodeJS.ErrnoException) => {
      if (error.code === "EEXIST") return undefined;
      throw error;
    });
    if (file === undefined) continue;
    own.add(name);
    try {
      await file.writeFile(bytes);
      await file.sync();
    } catch (error) {
      await file.close();
      await removeTemporary(path);
      throw error;
    }
    await file.close();
    return path;
  }
}

/** Removes an unfinished file; that it is gone already is fine. */
export async function removeTemporary(path: string): Promise<void> {
  own.delete(basename(path));
  await unlink(path).catch((error: NodeJS.ErrnoException) => {
    if (error.code !== "ENOENT") throw error;
  });
}

/**
 * Removes what crashed processes left unfinished: files of this machine whose process is gone, and files
 * of any machine that lie there for a day after others came and went.
 * Should a file in use be taken all the same (containers that share a name and process numbers), its
 * writer finds it missing and writes it again.
 */
export async function sweepTemporary(root: string): Promise<void> {
  const folder = join(root, temporaryFolder);
  const names = await readdir(folder).catch(() => [] as string[]);
  if (names.length === 0) return;
  const lastUse = (await stat(folder)).mtimeMs;
  for (const name of names) {
    const path = join(folder, name);
    const made = await stat(path).then(
      (found) => found.mtimeMs,
      () => lastUse,
    );
    const lost = isOrphan(name) || lastUse - made > lostAfterMilliseconds;
    if (lost) await removeTemporary(path).catch(() => undefined);
  }
}

/** Made on this machine, by a process that is gone, or by an earlier one that had our number. */
function isOrphan(name: string): boolean {
  const [machine, maker] = name.split(".");
  if (machine !== owner) return false;
  const number = Number(maker);
  if (number === process.pid) return !own.has(name);
  if (!Number.isSafeInteger(number) || number <= 0) return true;
  try {
    process.kill(number, 0);
    return false;
  } catch (error) {
    // Any other fault (EPERM) means that it lives, but belongs to someone else.
    return (error as NodeJS.ErrnoException).code === "ESRCH";
  }
}
