import { createHash } from "node:crypto";
import type { ObjectStore } from "../store/objectStore.ts";
import { seriesPrefix, tableEndings } from "./keys.ts";

/** A table's file as it stands now. */
export interface Source {
  readonly key: string;
  readonly bytes: Uint8Array;
  /** SHA-256, hexadecimal. */
  readonly digest: string;
}

/** Reads a table's file, by the first of the known endings that exists; `undefined` when there is none. */
export async function readSource(store: ObjectStore, table: string): Promise<Source | undefined> {
  for (const ending of tableEndings) {
    const key = `${seriesPrefix}${table}${ending}`;
    const found = await store.read(key);
    if (found)
      return { key, bytes: found.bytes, digest: createHash("sha256").update(found.bytes).digest("hex") };
  }
  return undefined;
}
