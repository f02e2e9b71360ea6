import { readdir, readFile } from "node:fs/promises";
import { demoTruths } from "../events/demo/truths.ts";
import { readMessage } from "../lib/job/readBack.ts";
import { replayRuns } from "../lib/job/replay.ts";
import type { ObjectStore } from "../lib/store/objectStore.ts";
import { openStore } from "../lib/store/openStore.ts";
import { exitCodeOf, messageText, progressLine, say } from "./terminal.ts";

const demoFolder = new URL("../events/demo/", import.meta.url);
const address = "./demo-store";
const weeks = 16;
const week = 7 * 86_400_000;

/** Lays the demo's tables and settings; a file that stands there already is left as it is. */
async function layDemo(store: ObjectStore): Promise<void> {
  await store.create("settings.json", await readFile(new URL("settings.json", demoFolder)));
  for (const name of await readdir(new URL("series/", demoFolder)))
    await store.create(`series/${name}`, await readFile(new URL(`series/${name}`, demoFolder)));
}

/** `demo`, the command when none is named: the tool-lending library, replayed week by week. */
export async function demoCommand(): Promise<number> {
  const store = openStore(address);
  await layDemo(store);
  const until = new Date(demoTruths.asOf);
  say(`A tool-lending library with four branches, in ${address}: its last ${weeks} weeks, run by run.`);
  const summaries = await replayRuns({
    store,
    from: new Date(until.getTime() - (weeks - 1) * week),
    until,
    every: "week",
    progress: progressLine(),
  });
  const newest = summaries[summaries.length - 1];
  const message = await readMessage(store, newest.asOf, "business");
  if (message) say("", "The newest message, as chat would show it:", "", messageText(message), "");
  say(
    `Report:    ${address}/${newest.report}`,
    `Forecasts: ${address}/forecasts/loans/latest.csv`,
    "Why:       npm start -- explain loans Quay --store ./demo-store",
  );
  return exitCodeOf(newest);
}
