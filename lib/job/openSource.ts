import { createHash } from "node:crypto";
import type { ObjectStore } from "../store/objectStore.ts";
import { seriesPrefix, tableEndings } from "./keys.ts";

/** A table's file as it stands now, to be read once, piece by piece: it may be larger than memory. */
export interface Source {
  readonly key: string;
  readonly pieces: AsyncIterable<Uint8Array>;
  /** SHA-256 of the pieces taken, hexadecimal; of the whole file once the last was taken. */
  digest(): string;
}

/** Opens a table's file, by the first of the known endings that exists; `undefined` when there is none. */
export async function openSource(store: ObjectStore, table: string): Promise<Source | undefined> {
  for (const ending of tableEndings) {
    const key = `${seriesPrefix}${table}${ending}`;
    const pieces = await store.stream(key);
    if (!pieces) continue;
    const hash = createHash("sha256");
    async function* hashed(from: AsyncIterable<Uint8Array>) {
      for await (const piece of from) {
        hash.update(piece);
        yield piece;
      }
    }
    return { key, pieces: hashed(pieces), digest: () => hash.copy().digest("hex") };
  }
  return undefined;
}
