import type { Voice } from "../words/facts.ts";
import type { Settings } from "./settings.ts";

/** How a store's owner wants to be spoken to. */
export function voiceOf(settings: Settings): Voice {
  const { locale, timeZone, quietWhenSteady, reportBase = null } = settings;
  return { locale, timeZone, quietWhenSteady, reportBase };
}
