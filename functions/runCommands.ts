import { readMessage } from "../lib/job/readBack.ts";
import { replayRuns } from "../lib/job/replay.ts";
import { runJob } from "../lib/job/run.ts";
import type { CommandOptions } from "./commandLine.ts";
import { refitOnThreads } from "./tableWorkers.ts";
import { exitCodeOf, messageText, progressLine, say, summaryLines } from "./terminal.ts";
import { instantOf, localSecrets, periodOf, storeOf, UsageError, workersOf } from "./usage.ts";

/** `run`: one run at one instant. */
export async function runOnceCommand(_words: readonly string[], options: CommandOptions): Promise<number> {
  const store = storeOf(options.store);
  const threads = workersOf(options.workers);
  const summary = await runJob({
    store,
    asOf: instantOf("as-of", options["as-of"]),
    secrets: localSecrets,
    refit: threads > 1 ? refitOnThreads(store.address, threads) : undefined,
    allowLocalWebhooks: options["allow-local-webhook"] ?? false,
    replaying: options.replaying ?? false,
    progress: progressLine(),
  });
  const message = await readMessage(store, summary.asOf, "business");
  if (message) say("", messageText(message), "");
  say(...summaryLines(summary, store.address));
  return exitCodeOf(summary);
}

/** `replay`: the past, run by run. */
export async function replayCommand(_words: readonly string[], options: CommandOptions): Promise<number> {
  if (!options.from) throw new UsageError("replay needs --from T");
  const store = storeOf(options.store);
  const from = instantOf("from", options.from);
  const until = instantOf("until", options.until);
  if (from > until) throw new UsageError("--from must lie before --until (without it: before now)");
  const summaries = await replayRuns({
    store,
    from,
    until,
    every: periodOf(options.every ?? "week"),
    progress: progressLine(),
  });
  for (const summary of summaries)
    if (summary.notices > 0)
      say(
        `${summary.asOf.slice(0, 10)}: ${summary.notices} notice(s), see ${store.address}/${summary.report}`,
      );
  const newest = summaries[summaries.length - 1];
  const message = await readMessage(store, newest.asOf, "business");
  if (message) say("", messageText(message), "");
  say(...summaryLines(newest, store.address));
  return exitCodeOf(newest);
}
