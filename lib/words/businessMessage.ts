import { newsFrom, type Ranked, ranked } from "./attention.ts";
import { percentWriter } from "./chances.ts";
import type { RunFacts, Voice } from "./facts.ts";
import { fillRoom } from "./fillRoom.ts";
import { barsPast } from "./forecastSentences.ts";
import { headline } from "./headline.ts";
import { dateWriter, reportPlace } from "./instants.ts";
import { sentenceLines } from "./lineWidth.ts";
import { messageData } from "./messageData.ts";
import { footerOf, type Note } from "./note.ts";
import { seriesLines } from "./seriesLines.ts";
import { speechFor, spokenInterval } from "./speech.ts";
import { nameInTable } from "./tableBefore.ts";
import { trackSentence } from "./trackSentence.ts";
import { owedLines, troubleLines } from "./troubleLines.ts";

/** Lines of a whole note, and the fewest that the series keep when much has gone wrong. */
const wholeNote = 12;
const least = 6;

/**
 * What those who order or staff need: what to expect next, what changed and what it means, in the unit of the data.
 * The most changed series come first and say the most; what does not fit is counted and stands in the report.
 *
 * @example businessMessage(run, voice).lines[0]
 * // "Quay: about 185 loans in the week of 7 December (155 to 210), about 1,400 over all 8 weeks (1,000 to 1,800). ▅▂…"
 */
export function businessMessage(run: RunFacts, voice: Voice): Note {
  const all = ranked(run);
  const candidates = voice.quietWhenSteady ? all.filter((one) => one.attention >= newsFrom) : all;
  const several = run.tables.length > 1;
  const before = owedLines(run, dateWriter(voice)).flatMap(sentenceLines);
  const after = [...closingLines(all, candidates.length > 0, voice), ...troubleLines(run)].flatMap(
    sentenceLines,
  );
  const { lines, told } = fillRoom(
    candidates.map((one) => {
      const speech = speechFor(one.facts, voice, run.asOf);
      const label = several
        ? nameInTable(one.table.table, one.facts.series, speech.series, 30)
        : speech.series;
      return { label, news: one.attention >= newsFrom, lines: seriesLines(speech, label) };
    }),
    Math.max(least, wholeNote - before.length - after.length - (all.length > 4 ? 1 : 0)),
  );
  return {
    title: headline(run),
    lines: [...before, ...lines, ...restLines(all.slice(told), told, run.untold), ...after],
    footer: footerOf(reportPlace(run.asOf, voice)),
    data: messageData(run, "business", all),
  };
}

/** "… and 41 steady." */
function restLines(hidden: readonly Ranked[], told: number, untold: RunFacts["untold"]): string[] {
  const { steady: alsoSteady, news: alsoNews } = untold ?? { steady: 0, news: 0 };
  const rest = hidden.length + alsoSteady + alsoNews;
  if (rest === 0) return [];
  const steady = hidden.filter((one) => one.attention < newsFrom).length + alsoSteady;
  const start = told > 0 ? "… and " : "";
  if (steady === rest) return [told > 0 ? `${start}${steady} more, steady.` : `${steady} steady.`];
  return [
    `${start}${rest} more, ${rest - steady} of them with news${alsoNews > 0 ? "" : "; all stand in the report"}.`,
  ];
}

/** What brackets and bars mean, and how good the ranges have been. */
function closingLines(all: readonly Ranked[], explain: boolean, voice: Voice): string[] {
  if (all.length === 0) return [];
  const { facts } = all[0];
  const level = percentWriter(voice.locale)(spokenInterval(facts.forecast.intervals).level);
  const same = all.every((one) => one.facts.period === facts.period);
  const periods = same ? `${facts.period}s` : "periods";
  const gaps = all.some((one) => one.facts.history.values.slice(-barsPast).includes(null));
  const record = trackSentence(
    all.map((one) => one.facts),
    voice,
  );
  return [
    ...(explain
      ? [
          `In brackets the range that holds ${level} of outcomes; bars: last ${barsPast} ${periods} | those to come${gaps ? " (· no figure)" : ""}.`,
        ]
      : []),
    ...(record ? [record] : []),
  ];
}
