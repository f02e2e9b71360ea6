import { parseArgs } from "node:util";
import { UsageError } from "./usage.ts";

const options = {
  store: { type: "string" },
  "as-of": { type: "string" },
  from: { type: "string" },
  until: { type: "string" },
  every: { type: "string" },
  json: { type: "boolean" },
  replaying: { type: "boolean" },
  "allow-local-webhook": { type: "boolean" },
  workers: { type: "string" },
  help: { type: "boolean", short: "h" },
} as const;

type OptionName = Exclude<keyof typeof options, "help">;

export interface CommandOptions {
  readonly store?: string;
  readonly "as-of"?: string;
  readonly from?: string;
  readonly until?: string;
  readonly every?: string;
  readonly json?: boolean;
  readonly replaying?: boolean;
  readonly "allow-local-webhook"?: boolean;
  readonly workers?: string;
}

/** What each command takes besides its name. */
const commands: Record<CommandName, { readonly words: number; readonly options: readonly OptionName[] }> = {
  demo: { words: 0, options: [] },
  run: { words: 0, options: ["store", "as-of", "workers", "replaying", "allow-local-webhook"] },
  replay: { words: 0, options: ["store", "from", "until", "every"] },
  check: { words: 0, options: ["store", "as-of", "json"] },
  explain: { words: 2, options: ["store", "as-of", "json"] },
};

export type CommandName = "demo" | "run" | "replay" | "check" | "explain";

/** One command line, understood. */
export interface CommandLine {
  readonly name: CommandName;
  /** What follows the command's name. */
  readonly words: readonly string[];
  readonly options: CommandOptions;
}

/**
 * Reads a command line; `undefined` when help is asked for. Whatever the command does not take is refused: a run that
 * leaves an option aside is not the run that was meant.
 *
 * @throws UsageError naming every option that belongs to another command
 */
export function commandLine(args: readonly string[]): CommandLine | undefined {
  const { values, positionals } = parse(args);
  const { help, ...given } = values;
  if (help) return undefined;
  const [name = "demo", ...words] = positionals;
  if (!isCommand(name)) throw new UsageError(`there is no command "${name}"`);
  const takes = commands[name];
  const strange = Object.keys(given).filter((option) => !takes.options.some((one) => one === option));
  if (strange.length > 0)
    throw new UsageError(strange.map((option) => strangeOption(option, name, positionals)).join("\n"));
  if (words.length > takes.words)
    throw new UsageError(
      `${name} takes ${takes.words === 0 ? "options alone" : "a table and a series"}: "${words[takes.words]}" is one word too many${takes.words === 0 ? "" : " (names with spaces go in quotation marks)"}`,
    );
  return { name, words, options: given };
}

function parse(args: readonly string[]) {
  try {
    return parseArgs({ args: [...args], allowPositionals: true, options });
  } catch (error) {
    throw new UsageError((error as Error).message);
  }
}

const isCommand = (name: string): name is CommandName => Object.hasOwn(commands, name);

function strangeOption(option: string, name: CommandName, positionals: readonly string[]): string {
  const owners = Object.entries(commands)
    .filter(([, takes]) => takes.options.some((one) => one === option))
    .map(([owner]) => owner);
  const [last, ...first] = owners.reverse();
  const list = first.length === 0 ? last : `${first.reverse().join(", ")} and ${last}`;
  const here = positionals.length === 0 ? "the demo, which runs when no command is named" : name;
  return `--${option} belongs to ${list}, not to ${here}`;
}
