import { percentWriter } from "./chances.ts";
import type { SeriesFacts, TrackRecord, Voice } from "./facts.ts";
import { numberWriter } from "./numbers.ts";

/** How earlier forecasts did, over all given series: counts add up, errors are compared as a ratio. */
export interface SharedRecord {
  readonly forecasts: number;
  readonly insideRange: number;
  readonly level: number;
  /** Error against repeating the last figure, or the last season where there is one, the geometric mean over series; `null` when no series allows it. */
  readonly relativeError: number | null;
}

/** The records of several series as one; `null` when none has one. Series scored at another level are left out. */
export function sharedRecord(all: readonly SeriesFacts[]): SharedRecord | null {
  const records = all.flatMap((one) =>
    one.trackRecord && one.trackRecord.forecasts > 0 ? [one.trackRecord] : [],
  );
  if (records.length === 0) return null;
  const { level } = records[0];
  const scored = records.filter((record) => record.level === level);
  const sum = (pick: (record: TrackRecord) => number) =>
    scored.reduce((total, record) => total + pick(record), 0);
  const logs = scored.flatMap((record) =>
    record.naiveMeanAbsoluteError > 0 && record.meanAbsoluteError > 0
      ? [Math.log(record.meanAbsoluteError / record.naiveMeanAbsoluteError)]
      : [],
  );
  return {
    forecasts: sum((record) => record.forecasts),
    insideRange: sum((record) => record.insideRange),
    level,
    relativeError:
      logs.length > 0 ? Math.exp(logs.reduce((total, one) => total + one, 0) / logs.length) : null,
  };
}

/** "So far 78 of 96 figures fell inside their range (80% is right); misses 25% smaller than by repeating the past." */
export function trackSentence(all: readonly SeriesFacts[], voice: Voice): string | null {
  const record = sharedRecord(all);
  if (!record) return null;
  const write = numberWriter(voice.locale);
  const percent = percentWriter(voice.locale);
  const figures = record.forecasts === 1 ? "figure" : "figures";
  const share = percent(Math.round((record.insideRange / record.forecasts) * 100));
  const inside = `So far ${write(record.insideRange, 1)} of ${write(record.forecasts, 1)} ${figures} (${share}) fell inside the range, where ${percent(record.level)} should`;
  return record.relativeError === null
    ? `${inside}.`
    : `${inside}; ${missWords(record.relativeError, percent)}.`;
}

function missWords(ratio: number, percent: (percent: number) => string): string {
  const change = Math.round((ratio - 1) * 100);
  if (Math.abs(change) < 3) return "misses are about as large as by repeating the past";
  return `misses are ${percent(Math.abs(change))} ${change < 0 ? "smaller" : "larger"} than by repeating the past`;
}
