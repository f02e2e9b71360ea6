import { parentPort, workerData } from "node:worker_threads";
import { refitPortion } from "../lib/job/refit.ts";
import { StoreError } from "../lib/store/objectStore.ts";
import { openStore } from "../lib/store/openStore.ts";
import type { WorkerAnswer, WorkerTask } from "./tableWorkers.ts";

// One thread of `run --workers N`: opens the store once and refits the tables it is handed.
const store = openStore(workerData as string);

parentPort?.on("message", async (task: WorkerTask) => {
  let answer: WorkerAnswer;
  try {
    answer = { result: await refitPortion({ store, ...task }) };
  } catch (error) {
    const fault = error instanceof Error ? error.message : String(error);
    answer =
      error instanceof StoreError ? { fault, store: { action: error.action, key: error.key } } : { fault };
  }
  parentPort?.postMessage(answer);
});
