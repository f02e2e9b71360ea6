import { runJob } from "../../lib/job/run.ts";
import { openStore } from "../../lib/store/openStore.ts";
import { type CrashPoint, crashingStore } from "./crashingStore.ts";

/** What one child process is to do. */
export interface ChildTask {
  readonly store: string;
  readonly asOf: string;
  /** Name of the environment variable with the webhook's address, and of that with its key. */
  readonly addressFrom: string;
  readonly keyFrom: string;
  readonly point?: CrashPoint;
  /** Added to the real time: a retry that comes so much later. */
  readonly later?: number;
}

// A process of its own that runs the job once, as a scheduler would start it: `node bundle.mjs TASK`, where TASK is
// a ChildTask in JSON. Prints the summary, or the error as a log would show it.
const task = JSON.parse(process.argv[2] ?? "{}") as ChildTask;
const store = crashingStore(openStore(task.store), task.point);
try {
  const summary = await runJob({
    store,
    asOf: task.asOf,
    webhooks: [
      {
        name: "counter",
        audience: "business",
        body: "text",
        address: `env:${task.addressFrom}`,
        signingKey: `env:${task.keyFrom}`,
      },
    ],
    secrets: async (reference) => process.env[reference.slice("env:".length)],
    allowLocalWebhooks: true,
    clock: () => Date.now() + (task.later ?? 0),
    progress: (progress) => console.log(JSON.stringify(progress)),
  });
  console.log(JSON.stringify({ summary, operations: store.operations.length }));
} catch (error) {
  console.error(error);
  process.exitCode = 1;
}
