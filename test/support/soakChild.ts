import { runJob } from "../../lib/job/run.ts";
import { FolderStore } from "../../lib/store/folderStore.ts";
import { fillStore } from "./jobStores.ts";
import { tinyTables } from "./tinyTables.ts";

// A process of its own for soak.test.ts: `node --expose-gc bundle.mjs FOLDER ADDRESS RUNS`. Runs the job again and
// again, each run on new values in a store of its own, and prints the heap in use after every twenty.
const [folder = "", address = "", runs = "0"] = process.argv.slice(2);
for (let run = 1; run <= Number(runs); run++) {
  const store = new FolderStore(`${folder}/${run}`);
  await fillStore(
    store,
    Object.fromEntries(
      Object.entries(tinyTables()).map(([key, text]) => [key, text.replace(/(\d)\n/g, `${run % 10}$1\n`)]),
    ),
  );
  await runJob({
    store,
    asOf: "2026-11-30T06:00:00Z",
    webhooks: [{ name: "counter", audience: "business", body: "text", address }],
    allowLocalWebhooks: true,
  });
  if (run % 20 === 0) {
    (globalThis as { gc?: () => void }).gc?.();
    console.log(JSON.stringify(process.memoryUsage()));
  }
}
