import type { Problem } from "../series/series.ts";
import type { ObjectStore } from "../store/objectStore.ts";
import { decodeText } from "./documents.ts";
import { settingsKey } from "./keys.ts";
import { parseSettings, type Settings, type SettingsInput } from "./settings.ts";

/** Settings that cannot be used: every problem at once. */
export class SettingsError extends Error {
  override readonly name = "SettingsError";
  readonly problems: readonly Problem[];
  constructor(problems: readonly Problem[]) {
    super(problems.map((problem) => `${problem.message}; ${problem.remedy}`).join("\n"));
    this.problems = problems;
  }
}

/**
 * Settings given by a program, checked and completed like those of a file.
 * @throws SettingsError listing every problem
 */
export function completeSettings(input: SettingsInput): Settings {
  const { settings, problems } = parseSettings(JSON.stringify(input));
  if (problems.some((problem) => problem.fatal)) throw new SettingsError(problems);
  return settings;
}

/**
 * The store's `settings.json`, or working defaults where there is none.
 * @throws SettingsError listing every problem; nothing has been written then
 */
export async function loadSettings(store: ObjectStore): Promise<Settings> {
  const found = await store.read(settingsKey);
  const { settings, problems } = parseSettings(found && decodeText(found.bytes));
  if (problems.some((problem) => problem.fatal)) throw new SettingsError(problems);
  return settings;
}
