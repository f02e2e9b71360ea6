import type { BigIntStats } from "node:fs";
import { readdir, stat } from "node:fs/promises";
import { join } from "node:path";
import { byKey, keyFault } from "./key.ts";
import type { ObjectEntry } from "./objectStore.ts";

/**
 * A file's version: which file, when it was last changed and how long it is. A file is replaced by a new
 * one here, never changed in place; an editor that does so moves the time.
 */
export function fileVersion(found: BigIntStats): string {
  return `${found.ino.toString(36)}-${found.mtimeNs.toString(36)}-${found.size.toString(36)}`;
}

/**
 * Every file below `root` whose key starts with `prefix`, ordered by key. Files and folders whose names
 * begin with a dot, or cannot be keys, are left out; symbolic links are followed, loops are not.
 * Names come as the file system gives them: some systems (APFS, NTFS) hold two spellings that differ in
 * case or Unicode form for one name, and then the spelling first written is the one listed.
 */
export async function listFolder(root: string, prefix: string): Promise<ObjectEntry[]> {
  const entries: ObjectEntry[] = [];
  const start = prefix.slice(0, prefix.lastIndexOf("/") + 1);
  await walk(join(root, start), start, prefix, [], entries);
  return entries.sort(byKey);
}

async function walk(
  folder: string,
  at: string,
  prefix: string,
  above: readonly string[],
  entries: ObjectEntry[],
): Promise<void> {
  const here = await stat(folder, { bigint: true }).catch(undefinedWhenAbsent);
  if (here === undefined || !here.isDirectory()) return;
  const identity = `${here.dev}:${here.ino}`;
  if (above.includes(identity)) return;
  const names = (await readdir(folder).catch(undefinedWhenAbsent)) ?? [];
  for (const name of names) {
    const key = at + name;
    if (keyFault(key) !== undefined) continue;
    if (!key.startsWith(prefix) && !prefix.startsWith(`${key}/`)) continue;
    const path = join(folder, name);
    // Gone since the folder was read, or a link to nothing: not an object.
    const found = await stat(path, { bigint: true }).catch(undefinedWhenAbsent);
    if (found === undefined) continue;
    if (found.isDirectory()) await walk(path, `${key}/`, prefix, [...above, identity], entries);
    else if (found.isFile() && key.startsWith(prefix)) {
      entries.push({ key, size: Number(found.size), version: fileVersion(found) });
    }
  }
}

/** For `catch`: nothing there is `undefined`, every other fault goes on. */
export function undefinedWhenAbsent(error: NodeJS.ErrnoException): undefined {
  if (error.code === "ENOENT" || error.code === "ENOTDIR") return undefined;
  throw error;
}
