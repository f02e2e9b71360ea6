import type { RunFacts, Voice } from "./facts.ts";
import { numberWriter } from "./numbers.ts";

/** How many notices chance alone would bring in a year of looks if nothing ever changed. */
export function falseNotices(run: RunFacts, voice: Voice): string {
  const watched = run.tables.reduce(
    (sum, table) => sum + table.series.filter((one) => one.monitor).length,
    run.untold?.watched ?? 0,
  );
  if (watched === 0) return "No series is watched yet, so no notices can come.";
  const write = numberWriter(voice.locale);
  const expected = write(run.expectedFalseNotices, run.expectedFalseNotices < 10 ? 0.1 : 1);
  return `If all ${write(watched, 1)} watched series stayed steady, chance alone would bring about ${expected} notices in a year of looks.`;
}
