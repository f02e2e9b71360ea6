import { newsFrom, type Ranked, ranked } from "./attention.ts";
import { percentWriter } from "./chances.ts";
import type { RunFacts, Voice } from "./facts.ts";
import { headline } from "./headline.ts";
import { dateWriter, reportPlace } from "./instants.ts";
import { wrapLine } from "./lineWidth.ts";
import { messageData } from "./messageData.ts";
import { caution, type Note } from "./note.ts";
import { plainText } from "./plainText.ts";
import { type RankedLine, seriesLines } from "./seriesLines.ts";
import { speechFor, spokenInterval } from "./speech.ts";
import { trackSentence } from "./trackSentence.ts";
import { owedLines, troubleLines } from "./troubleLines.ts";

/** Lines the series may take in all; with the closing lines a note for one table has about twelve. */
const room = 10;

/**
 * What those who order or staff need: what to expect next, what changed and what it means, in the unit of the data.
 * The most changed series come first and say the most; what does not fit is counted and stands in the report.
 */
export function businessMessage(run: RunFacts, voice: Voice): Note {
  const all = ranked(run);
  const told = voice.quietWhenSteady ? all.filter((one) => one.attention >= newsFrom) : all;
  const several = run.tables.length > 1;
  const { lines, shown } = fillRoom(
    told.map((one) => {
      const speech = speechFor(one.facts, voice, run.asOf);
      return seriesLines(
        speech,
        several ? `${plainText(one.table.table, 30)}, ${speech.series}` : speech.series,
      );
    }),
  );
  const rest = all.length - shown;
  return {
    title: headline(run),
    lines: [
      ...owedLines(run, dateWriter(voice)),
      ...lines,
      ...(rest > 0 ? [restLine(rest, all.slice(shown), shown)] : []),
      ...closingLines(all, voice),
      ...troubleLines(run),
      ...(all.length > 0 ? [`Why, with pictures: ${reportPlace(run.asOf, voice)}`] : []),
    ].flatMap((line) => (line.startsWith("Why, ") ? [line] : wrapLine(line))),
    footer: caution,
    data: messageData(run, "business", all),
  };
}

/** Gives up the least needed lines first, then whole series from the end, until what is left fits. */
function fillRoom(series: readonly (readonly RankedLine[])[]): { lines: string[]; shown: number } {
  const shown = series.slice(0, room);
  const wrapped = shown.map((lines) => lines.map((line) => ({ ...line, texts: wrapLine(line.text) })));
  const cost = (deepest: number) =>
    wrapped.flat().reduce((sum, line) => sum + (line.rank <= deepest ? line.texts.length : 0), 0);
  let deepest = Math.max(0, ...wrapped.flat().map((line) => line.rank));
  while (deepest > 0 && cost(deepest) > room) deepest--;
  let left = room;
  const lines: string[] = [];
  let count = 0;
  // What the common depth leaves free goes to the first series, whose lines then reach one rank further.
  let spare = room - cost(deepest);
  for (const one of wrapped) {
    const kept = one.filter((line) => {
      if (line.rank <= deepest) return true;
      if (line.rank > deepest + 2 || line.texts.length > spare) return false;
      spare -= line.texts.length;
      return true;
    });
    const texts = kept.flatMap((line) => line.texts);
    if (texts.length > left && count > 0) break;
    lines.push(...texts);
    left -= texts.length;
    count++;
  }
  return { lines, shown: count };
}

function restLine(rest: number, hidden: readonly Ranked[], shown: number): string {
  const steady = hidden.filter((one) => one.attention < newsFrom).length;
  const start = shown > 0 ? "… and " : "";
  if (steady === rest) return `${start}${rest} steady.`;
  return `${start}${rest} more, ${steady} of them steady; all stand in the report.`;
}

/** How good the ranges have been, and what a range means. */
function closingLines(all: readonly Ranked[], voice: Voice): string[] {
  if (all.length === 0) return [];
  const level = percentWriter(voice.locale)(spokenInterval(all[0].facts.forecast.intervals).level);
  const record = trackSentence(
    all.map((one) => one.facts),
    voice,
  );
  return [record ?? `A range is meant to hold the figure ${level} of the time.`];
}
