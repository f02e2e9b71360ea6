import { execFile } from "node:child_process";
import { createHash } from "node:crypto";
import { readdir } from "node:fs/promises";
import { runJob } from "../../lib/job/run.ts";
import type { RunSummary } from "../../lib/job/summary.ts";
import { FolderStore } from "../../lib/store/folderStore.ts";
import type { ObjectStore } from "../../lib/store/objectStore.ts";
import { S3Store } from "../../lib/store/s3Store.ts";
import { canary, leaks } from "./canary.ts";
import { cephBucket, gateway } from "./cephStore.ts";
import type { ChildTask } from "./jobChild.ts";
import { fillStore } from "./jobStores.ts";
import { temporaryFolder } from "./temporaryFolder.ts";
import { tinyAsOf, tinyTables } from "./tinyTables.ts";

/** A new store with the tiny tables in it. */
export interface TinyStore {
  readonly store: ObjectStore;
  /** What a child process needs to reach it. */
  readonly endpoint?: string;
  /** The same store as another process would open it. */
  readonly reopen: () => ObjectStore;
}

/** In a folder, or in a prefix of one bucket on the gateway. */
export function tinyStores(kind: "folder" | "bucket"): () => Promise<TinyStore> {
  let bucket: Promise<string> | undefined;
  let made = 0;
  return async () => {
    const tiny = await (kind === "folder" ? inFolder() : inBucket());
    await fillStore(tiny.store, tinyTables());
    return tiny;
  };
  async function inFolder(): Promise<TinyStore> {
    const folder = await temporaryFolder();
    const reopen = () => new FolderStore(folder);
    return { store: reopen(), reopen };
  }
  async function inBucket(): Promise<TinyStore> {
    bucket ??= cephBucket();
    const { endpoint } = await gateway();
    const [name, prefix] = [await bucket, `tiny/${made++}`];
    const reopen = () => new S3Store(name, prefix, { endpoint });
    return { store: reopen(), endpoint, reopen };
  }
}

/** The webhook of a tiny run: its receiver's address, with a mark in the query that tells runs apart. */
export const hookOf = (port: number, mark: string) => `http://127.0.0.1:${port}${canary.path}?run=${mark}`;

/** Runs the job in this process. `later` moves its clock, as for a retry that comes so many milliseconds later. */
export function tinyRun(
  store: ObjectStore,
  address: string,
  later = 0,
  asOf = tinyAsOf,
): Promise<RunSummary> {
  return runJob({
    store,
    asOf,
    webhooks: [{ name: "counter", audience: "business", body: "text", address, signingKey: "env:HOOK_KEY" }],
    secrets: async () => canary.signingKey,
    allowLocalWebhooks: true,
    clock: () => Date.now() + later,
  });
}

export interface ChildEnd {
  readonly code: number | null;
  readonly signal: NodeJS.Signals | null;
  /** Standard output and error. */
  readonly output: string;
}

/** Runs the job in a process of its own, whose environment holds the secrets; `killAfter` ends it after so long. */
export function childRun(
  program: string,
  { store, endpoint }: TinyStore,
  address: string,
  more: Pick<ChildTask, "point" | "later">,
  killAfter?: number,
): Promise<ChildEnd> {
  const task: ChildTask = {
    store: store.address,
    asOf: tinyAsOf,
    addressFrom: "HOOK",
    keyFrom: "HOOK_KEY",
    ...more,
  };
  const env = {
    ...process.env,
    HOOK: address,
    HOOK_KEY: canary.signingKey,
    ...(endpoint === undefined ? {} : { AWS_ENDPOINT_URL_S3: endpoint }),
  };
  return new Promise((resolve) => {
    const child = execFile(
      process.execPath,
      [program, JSON.stringify(task)],
      { env },
      (_error, stdout, stderr) => {
        clearTimeout(timer);
        resolve({ code: child.exitCode, signal: child.signalCode, output: stdout + stderr });
      },
    );
    const timer = killAfter === undefined ? undefined : setTimeout(() => child.kill("SIGKILL"), killAfter);
  });
}

/**
 * SHA-256 of all documents by key, but the claims of senders, which say who held them until when. Fails on any
 * document with a planted secret in it.
 */
export async function documents(store: ObjectStore): Promise<Record<string, string>> {
  const read = async ({ key }: { key: string }) =>
    [key, new TextDecoder().decode((await store.read(key))?.bytes)] as const;
  const texts = await Promise.all((await store.list("")).map(read));
  for (const [key, text] of texts) {
    const leaked = leaks(key + text);
    if (leaked.length > 0) throw new Error(`${key} holds ${leaked.length} planted secrets`);
  }
  const kept = texts.filter(([key]) => !key.includes("/delivering-"));
  return Object.fromEntries(
    kept.map(([key, text]) => [key, createHash("sha256").update(text).digest("hex")]),
  );
}

/** Every file of a folder store, hidden ones included, that its listing does not show. */
export async function strayFiles(store: ObjectStore): Promise<string[]> {
  if (!(store instanceof FolderStore)) return [];
  const listed = new Set((await store.list("")).map(({ key }) => key));
  const found = await readdir(store.address, { recursive: true, withFileTypes: true });
  return found
    .filter((entry) => entry.isFile())
    .map((entry) => `${entry.parentPath}/${entry.name}`.slice(store.address.length + 1))
    .filter((path) => !listed.has(path));
}
