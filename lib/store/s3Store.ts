import { keyFault, prefixFault } from "./key.ts";
import type { ObjectEntry, ObjectStore, StoredObject } from "./objectStore.ts";
import { StoreError } from "./objectStore.ts";
import type { S3Access, S3Settings } from "./s3Client.ts";
import { connectS3 } from "./s3Client.ts";
import { plainS3Error, s3Failure } from "./s3Failure.ts";
import { listS3 } from "./s3Listing.ts";
import { readS3 } from "./s3Reading.ts";
import { createS3, honoursConditions, putS3, type S3Target } from "./s3Writing.ts";

/** A store in an S3 bucket, below a prefix; see `createS3` for how an object is created once. */
export class S3Store implements ObjectStore {
  readonly address: string;
  readonly #bucket: string;
  readonly #base: string;
  readonly #settings: S3Settings;
  #access: Promise<S3Access> | undefined;
  /** Whether the server is known to honour conditions. */
  #trusted: boolean;

  /** @throws {TypeError} when `prefix` could not begin a key */
  constructor(bucket: string, prefix: string, settings: S3Settings) {
    const bare = prefix.replace(/\/+$/, "");
    const fault = prefixFault(bare);
    if (fault !== undefined) throw new TypeError(`S3Store needs a sound prefix: ${fault}`);
    this.address = bare === "" ? `s3://${bucket}` : `s3://${bucket}/${bare}`;
    this.#bucket = bucket;
    this.#base = bare === "" ? "" : `${bare}/`;
    this.#settings = settings;
    this.#trusted = settings.endpoint === undefined;
  }

  async read(key: string): Promise<StoredObject | undefined> {
    return this.#guard("read", key, async (access) => {
      const reading = await this.#unlessAbsent(access, key);
      if (reading === undefined) return undefined;
      const pieces: Uint8Array[] = [];
      for await (const piece of reading.pieces()) pieces.push(piece);
      return { bytes: new Uint8Array(Buffer.concat(pieces)), version: reading.version };
    });
  }

  async stream(key: string): Promise<AsyncIterable<Uint8Array> | undefined> {
    return this.#guard("read", key, async (access) => {
      const reading = await this.#unlessAbsent(access, key);
      return reading === undefined ? undefined : this.#guarded(key, reading.pieces());
    });
  }

  async create(key: string, bytes: Uint8Array): Promise<"created" | "exists"> {
    return this.#guard("create", key, async (access) => {
      const target = this.#target(key, bytes);
      const outcome = await createS3(access, target);
      if (outcome === "created" && !this.#trusted) await this.#tryConditions(access, target);
      return outcome;
    });
  }

  async write(key: string, bytes: Uint8Array): Promise<void> {
    await this.#guard("write", key, (access) => putS3(access, this.#target(key, bytes)));
  }

  async list(prefix: string): Promise<ObjectEntry[]> {
    return this.#guard("list", prefix, (access) => listS3(access, this.#bucket, this.#base, prefix));
  }

  #target(key: string, bytes: Uint8Array): S3Target {
    return { bucket: this.#bucket, key: this.#base + key, bytes };
  }

  /** Once a process, and only with a server other than AWS's. */
  async #tryConditions(access: S3Access, created: S3Target): Promise<void> {
    const honours = await honoursConditions(access, created);
    if (honours === false) {
      throw new Error(
        "this server takes no notice of If-None-Match, so that two runs could overwrite each other; use one that honours it",
      );
    }
    this.#trusted ||= honours === true;
  }

  /**
   * Starts to read; absent is `undefined`. Without the right to list, S3 answers 403 for an absent key too,
   * and so it does where that right holds for some prefixes only: a listing of the key itself tells.
   */
  async #unlessAbsent(access: S3Access, key: string) {
    try {
      return await readS3(access, this.#bucket, this.#base + key);
    } catch (error) {
      const failure = s3Failure(error);
      if (failure === "absent") return undefined;
      if (failure === "denied" && (await this.#listedAsAbsent(access, key))) return undefined;
      throw error;
    }
  }

  async #listedAsAbsent(access: S3Access, key: string): Promise<boolean> {
    try {
      const found = await listS3(access, this.#bucket, this.#base, key);
      return !found.some((entry) => entry.key === key);
    } catch {
      throw new Error("access denied; or absent, which cannot be told without s3:ListBucket for this key");
    }
  }

  async *#guarded(key: string, pieces: AsyncIterable<Uint8Array>): AsyncIterable<Uint8Array> {
    try {
      yield* pieces;
    } catch (error) {
      throw this.#fault("read", key, error);
    }
  }

  async #guard<T>(
    action: StoreError["action"],
    key: string,
    work: (access: S3Access) => Promise<T>,
  ): Promise<T> {
    try {
      const fault = action === "list" ? prefixFault(key) : keyFault(this.#base + key);
      if (fault !== undefined) throw new Error(fault);
      this.#access ??= connectS3(this.#settings);
      return await work(await this.#access);
    } catch (error) {
      throw this.#fault(action, key, error);
    }
  }

  #fault(action: StoreError["action"], key: string, error: unknown): StoreError {
    return error instanceof StoreError
      ? error
      : new StoreError(this.address, action, key, plainS3Error(error));
  }
}
