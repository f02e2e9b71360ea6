import { gunzipSync, gzipSync } from "node:zlib";
import type { ObjectStore } from "../store/objectStore.ts";

const decoder = new TextDecoder();
const encoder = new TextEncoder();

/** JSON as it is stored: the same bytes for the same data, a line break at the end. */
export const encodeDocument = (data: unknown): Uint8Array => encoder.encode(`${JSON.stringify(data)}\n`);
const isCompressed = (key: string) => key.endsWith(".gz");
/** The quickest level: the digits of numbers hardly shrink with more. */
const compress = (bytes: Uint8Array): Uint8Array => gzipSync(bytes, { level: 1 });
export const encodeText = (text: string): Uint8Array => encoder.encode(text);
export const decodeText = (bytes: Uint8Array): string => decoder.decode(bytes);

/** Every document we write says its schema; a reader meets an unknown one with a clear error, never with a guess. */
export interface Versioned {
  readonly schema: 1;
}

/**
 * Reads one of our own documents, compressed when its key ends in `.gz`.
 * @throws Error naming the key when it is not JSON or of a schema this version does not know
 */
export async function readDocument<T extends Versioned>(
  store: ObjectStore,
  key: string,
): Promise<T | undefined> {
  const found = await store.read(key);
  if (!found) return undefined;
  let data: unknown;
  try {
    data = JSON.parse(decodeText(isCompressed(key) ? gunzipSync(found.bytes) : found.bytes));
  } catch {
    throw new Error(
      `"${key}" in ${store.address} is not the JSON that was written there; restore an earlier version of it`,
    );
  }
  const schema = (data as Partial<Versioned> | null)?.schema;
  if (schema !== 1)
    throw new Error(
      `"${key}" in ${store.address} has schema ${String(schema)}, this version reads schema 1; use a newer version`,
    );
  return data as T;
}

/** Writes a document once; when another writer was first, theirs is returned and is the truth from then on. */
export async function createDocument<T extends Versioned>(
  store: ObjectStore,
  key: string,
  data: T,
): Promise<T> {
  const bytes = encodeDocument(data);
  if ((await store.create(key, isCompressed(key) ? compress(bytes) : bytes)) === "created") return data;
  const standing = await readDocument<T>(store, key);
  if (!standing)
    throw new Error(`"${key}" in ${store.address} was there a moment ago and is gone; run again`);
  return standing;
}
