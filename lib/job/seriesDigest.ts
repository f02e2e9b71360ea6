import { createHash } from "node:crypto";
import type { KnownEvent } from "../series/readEvents.ts";
import type { Series } from "../series/series.ts";
import type { TableSettings } from "../series/tableSettings.ts";
import type { Settings } from "./settings.ts";

/**
 * Names what an account of a series rests on: every value (a revision anywhere in the past changes it), the known
 * events, and the settings that shape it.
 */
export function seriesDigest(
  series: Series,
  shaping: {
    readonly settings: Settings;
    readonly tableSettings: TableSettings;
    readonly events: readonly KnownEvent[];
  },
): string {
  const { settings, tableSettings, events } = shaping;
  const { horizon, levels, falseAlarmRate } = settings;
  const { start, period, values } = series;
  const named = { start, period, horizon, levels, falseAlarmRate, tableSettings, events };
  const bytes = new Uint8Array(values.buffer, values.byteOffset, values.byteLength);
  return createHash("sha256").update(JSON.stringify(named)).update(bytes).digest("hex").slice(0, 32);
}
