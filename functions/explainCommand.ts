import { asOfText } from "../lib/job/keys.ts";
import { loadSettings } from "../lib/job/loadSettings.ts";
import { readFacts, whyNoFacts } from "../lib/job/readBack.ts";
import { voiceOf } from "../lib/job/voice.ts";
import { explainSeries } from "../lib/words/explainSeries.ts";
import type { CommandOptions } from "./commandLine.ts";
import { say } from "./terminal.ts";
import { instantOf, storeOf, UsageError } from "./usage.ts";

/** `explain`: an analyst's account of one series, or of every series of a table. */
export async function explainCommand(words: readonly string[], options: CommandOptions): Promise<number> {
  const [table, name] = words;
  if (!table) throw new UsageError("explain needs the name of a table");
  const store = storeOf(options.store);
  const settings = await loadSettings(store);
  const asOf = asOfText(instantOf("as-of", options["as-of"]));
  const found = await readFacts(store, table, asOf);
  if (!found) throw new UsageError(await whyNoFacts(store, table, asOf));
  const chosen = found.series.filter((facts) => name === undefined || facts.series === name);
  if (chosen.length === 0)
    throw new UsageError(
      `table "${table}" has no series "${name}"; it has ${found.series.map((one) => one.series).join(", ")}`,
    );
  if (options.json) {
    say(JSON.stringify({ table, asOf: found.asOf, series: chosen }, null, 2));
    return 0;
  }
  const voice = voiceOf(settings);
  for (const facts of chosen) say(...explainSeries(table, facts, voice), "");
  return 0;
}
