import { randomUUID } from "node:crypto";
import { contentType } from "./contentType.ts";
import { keyFault, prefixFault } from "./key.ts";
import type { ObjectEntry, ObjectStore, StoredObject } from "./objectStore.ts";
import { StoreError } from "./objectStore.ts";
import type { S3Access, S3Settings } from "./s3Client.ts";
import { connectS3 } from "./s3Client.ts";
import { attempts, plainS3Error, s3Failure } from "./s3Failure.ts";
import { listS3 } from "./s3Listing.ts";
import { readS3 } from "./s3Reading.ts";

/** How often a create that met another one under way (409) is sent, the first time included. */
const createTries = 6;

/**
 * A store in an S3 bucket, below a prefix. `create` is a put with `If-None-Match: *`.
 *
 * Each create carries a mark of its own as metadata. The SDK repeats a put whose answer was lost, and then
 * finds its own object in the way (412); the mark tells that from another writer's object, even when the
 * bytes are the same.
 */
export class S3Store implements ObjectStore {
  readonly address: string;
  readonly #bucket: string;
  readonly #base: string;
  readonly #settings: S3Settings;
  #access: Promise<S3Access> | undefined;

  /** @throws {TypeError} when `prefix` could not begin a key */
  constructor(bucket: string, prefix: string, settings: S3Settings) {
    const bare = prefix.replace(/\/+$/, "");
    const fault = prefixFault(bare);
    if (fault !== undefined) throw new TypeError(`S3Store needs a sound prefix: ${fault}`);
    this.address = bare === "" ? `s3://${bucket}` : `s3://${bucket}/${bare}`;
    this.#bucket = bucket;
    this.#base = bare === "" ? "" : `${bare}/`;
    this.#settings = settings;
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
      const mark = randomUUID();
      // Whether an earlier sending may have been carried out without our hearing of it.
      let mayHaveWon = false;
      for (let attempt = 1; ; attempt++) {
        try {
          await this.#put(access, key, bytes, { IfNoneMatch: "*", Metadata: { writer: mark } });
          return "created";
        } catch (error) {
          const failure = s3Failure(error);
          mayHaveWon ||= attempts(error) > 1;
          if (failure === "exists") {
            return mayHaveWon && (await this.#writer(access, key)) === mark ? "created" : "exists";
          }
          if (failure !== "conflict" || attempt === createTries) throw error;
          await new Promise((resolve) => setTimeout(resolve, 50 * 2 ** attempt));
        }
      }
    });
  }

  async write(key: string, bytes: Uint8Array): Promise<void> {
    await this.#guard("write", key, (access) => this.#put(access, key, bytes, {}));
  }

  async list(prefix: string): Promise<ObjectEntry[]> {
    return this.#guard("list", prefix, (access) => listS3(access, this.#bucket, this.#base, prefix));
  }

  async #put(
    { sdk, client }: S3Access,
    key: string,
    bytes: Uint8Array,
    more: { IfNoneMatch?: string; Metadata?: Record<string, string> },
  ): Promise<void> {
    const target = { Bucket: this.#bucket, Key: this.#base + key, ContentType: contentType(key) };
    await client.send(new sdk.PutObjectCommand({ ...target, Body: bytes, ...more }));
  }

  /** The mark of whoever created the object that stands there. */
  async #writer({ sdk, client }: S3Access, key: string): Promise<string | undefined> {
    const head = await client.send(
      new sdk.HeadObjectCommand({ Bucket: this.#bucket, Key: this.#base + key }),
    );
    return head.Metadata?.writer;
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
