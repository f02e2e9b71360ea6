import type { ObjectStore } from "../../lib/store/objectStore.ts";
import { StoreError } from "../../lib/store/objectStore.ts";

/** Where a run is to break: at its n-th store operation (1 for the first), before or after it is carried out. */
export interface CrashPoint {
  readonly operation: number;
  readonly when: "before" | "after";
  /** `throw` a StoreError there, or `kill` the whole process with SIGKILL. */
  readonly how: "throw" | "kill";
}

/** One operation as the store saw it. */
export interface Operation {
  readonly action: "read" | "stream" | "create" | "write" | "list";
  readonly key: string;
}

/**
 * A store that passes everything on, keeps a record of it, and breaks at one point, if given. After a `throw` point
 * every further operation fails too, as for a process that has lost its store.
 */
export function crashingStore(
  store: ObjectStore,
  point?: CrashPoint,
): ObjectStore & { readonly operations: readonly Operation[] } {
  const operations: Operation[] = [];
  let broken = false;

  async function pass<T>(action: Operation["action"], key: string, work: () => Promise<T>): Promise<T> {
    operations.push({ action, key });
    const here = operations.length === point?.operation;
    const fail = (): never => {
      if (point?.how === "kill") process.kill(process.pid, "SIGKILL");
      broken = true;
      throw new StoreError(
        store.address,
        action === "stream" ? "read" : action,
        key,
        new Error("crash as told"),
      );
    };
    if (broken || (here && point.when === "before")) return fail();
    const result = await work();
    return here ? fail() : result;
  }

  return {
    address: store.address,
    operations,
    read: (key) => pass("read", key, () => store.read(key)),
    stream: (key) => pass("stream", key, () => store.stream(key)),
    create: (key, bytes) => pass("create", key, () => store.create(key, bytes)),
    write: (key, bytes) => pass("write", key, () => store.write(key, bytes)),
    list: (prefix) => pass("list", prefix, () => store.list(prefix)),
  };
}
