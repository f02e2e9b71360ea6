import { SettingsError } from "../lib/job/loadSettings.ts";
import { NoTablesError } from "../lib/job/noTables.ts";
import { OutdatedRunError } from "../lib/job/run.ts";
import { StoreError } from "../lib/store/objectStore.ts";
import { checkCommand } from "./checkCommand.ts";
import { type CommandName, type CommandOptions, commandLine } from "./commandLine.ts";
import { demoCommand } from "./demoCommand.ts";
import { explainCommand } from "./explainCommand.ts";
import { replayCommand, runOnceCommand } from "./runCommands.ts";
import { UsageError } from "./usage.ts";

const usage = `ebbwire: forecasts for every series in a store, and a note when shocks start to fade differently

  npm start                                              the demo, in ./demo-store
  npm start -- run     --store S [--as-of T]             one run
  npm start -- replay  --store S --from T [--until T] [--every week]
                                                         the past, run by run; posts nothing
  npm start -- check   --store S [--as-of T] [--json]    reads everything, writes nothing, lists every problem
  npm start -- explain TABLE [SERIES] --store S [--as-of T] [--json]
                                                         an analyst's account

  S is a folder or s3://bucket/prefix; T an ISO instant such as 2026-11-30T06:00:00Z (default: now)
  run also takes --workers N (threads; default: all processors but one), --replaying (an older T), and
  --allow-local-webhook (plain http to this machine, for tests)
  exit codes: 0 done, 1 some table or the store failed, 2 wrong use or no table in the store, 3 a note was not
  delivered
`;

type Command = (words: readonly string[], options: CommandOptions) => Promise<number>;

const commands: Record<CommandName, Command> = {
  demo: demoCommand,
  run: runOnceCommand,
  replay: replayCommand,
  check: checkCommand,
  explain: explainCommand,
};

/** Runs one command line and says the exit code. Mistakes of use and of settings are told without a stack trace. */
export async function runCommand(words: readonly string[]): Promise<number> {
  try {
    const line = commandLine(words);
    if (!line) {
      process.stdout.write(usage);
      return 0;
    }
    return await commands[line.name](line.words, line.options);
  } catch (error) {
    if (error instanceof UsageError) {
      process.stderr.write(`${error.message}\n(npm start -- --help lists the commands)\n`);
      return 2;
    }
    if (
      error instanceof SettingsError ||
      error instanceof NoTablesError ||
      error instanceof OutdatedRunError
    ) {
      process.stderr.write(`${error.message}\n`);
      return 2;
    }
    if (error instanceof StoreError) {
      process.stderr.write(`${error.message}\n`);
      return 1;
    }
    throw error;
  }
}
