import { createHash } from "node:crypto";
import type { ObjectEntry, ObjectStore, StoredObject } from "../../lib/store/objectStore.ts";

/** A store in memory, for tests of what stands above stores. Counts its calls. */
export class MemoryStore implements ObjectStore {
  readonly address = "memory";
  readonly objects = new Map<string, Uint8Array>();
  calls = 0;

  async read(key: string): Promise<StoredObject | undefined> {
    this.calls++;
    const bytes = this.objects.get(key);
    return bytes && { bytes, version: createHash("sha256").update(bytes).digest("hex") };
  }

  async stream(key: string): Promise<AsyncIterable<Uint8Array> | undefined> {
    const found = await this.read(key);
    return (
      found &&
      (async function* () {
        yield found.bytes;
      })()
    );
  }

  async create(key: string, bytes: Uint8Array): Promise<"created" | "exists"> {
    this.calls++;
    if (this.objects.has(key)) return "exists";
    this.objects.set(key, bytes);
    return "created";
  }

  async write(key: string, bytes: Uint8Array): Promise<void> {
    this.calls++;
    this.objects.set(key, bytes);
  }

  async list(prefix: string): Promise<ObjectEntry[]> {
    this.calls++;
    return [...this.objects.keys()]
      .filter((key) => key.startsWith(prefix))
      .sort()
      .map((key) => ({ key, size: this.objects.get(key)?.length ?? 0, version: "" }));
  }

  /** Everything that stands in the store, as text by key. */
  texts(): Record<string, string> {
    return Object.fromEntries(
      [...this.objects]
        .sort(([a], [b]) => (a < b ? -1 : 1))
        .map(([key, bytes]) => [key, new TextDecoder().decode(bytes)]),
    );
  }
}
