/** One object in a listing. `version` changes whenever the bytes do. */
export interface ObjectEntry {
  readonly key: string;
  readonly size: number;
  readonly version: string;
}

/** The bytes of one object, with the version they belong to. */
export interface StoredObject {
  readonly bytes: Uint8Array;
  readonly version: string;
}

/**
 * The whole of what the job asks of storage. Keys are relative, with `/` between parts.
 * Absent is `undefined`; every fault throws a `StoreError`. There is no delete.
 */
export interface ObjectStore {
  /** How a person would name this store: a folder path or `s3://bucket/prefix`. */
  readonly address: string;
  read(key: string): Promise<StoredObject | undefined>;
  /** The object's bytes in pieces, for tables too large to hold. */
  stream(key: string): Promise<AsyncIterable<Uint8Array> | undefined>;
  /** Writes only where nothing stands yet; the first writer wins. A retried write that had won says `created`. */
  create(key: string, bytes: Uint8Array): Promise<"created" | "exists">;
  /** Writes or replaces, as a whole: a reader sees the old bytes or the new. */
  write(key: string, bytes: Uint8Array): Promise<void>;
  /** Every object whose key starts with `prefix`, ordered by key (code units), complete or an error. */
  list(prefix: string): Promise<ObjectEntry[]>;
}

/** A fault of the store itself: names the store, the action and the key. */
export class StoreError extends Error {
  override readonly name = "StoreError";
  readonly action: "read" | "create" | "write" | "list";
  readonly key: string;
  constructor(address: string, action: StoreError["action"], key: string, cause: unknown) {
    const reason = cause instanceof Error ? cause.message || cause.name : String(cause);
    super(`could not ${action} "${key}" in ${address}: ${reason}`, { cause });
    this.action = action;
    this.key = key;
  }
}
