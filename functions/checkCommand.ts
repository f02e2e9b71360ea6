import { checkStore } from "../lib/job/check.ts";
import { describeCheck } from "../lib/job/describeCheck.ts";
import type { CommandOptions } from "./commandLine.ts";
import { say } from "./terminal.ts";
import { instantOf, storeOf } from "./usage.ts";

/** `check`: reads everything, writes nothing. */
export async function checkCommand(_words: readonly string[], options: CommandOptions): Promise<number> {
  const report = await checkStore({
    store: storeOf(options.store),
    asOf: instantOf("as-of", options["as-of"]),
  });
  if (options.json) say(JSON.stringify(report, null, 2));
  else say(...describeCheck(report));
  return report.failed > 0 ? 1 : 0;
}
