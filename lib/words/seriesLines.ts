import { periodStart } from "../series/periods.ts";
import { changeDate, changeHeadline, changeMeaning } from "./changeWords.ts";
import type { Finding } from "./facts.ts";
import { bars, barsPast, chanceSentences, nextSentence, totalSentence } from "./forecastSentences.ts";
import { fits, sentence } from "./lineWidth.ts";
import {
  comingEventSentence,
  forecastNoteSentence,
  gapsSentence,
  revisedSentence,
  staleSentence,
  surpriseRemainder,
  surpriseSentence,
} from "./otherFindings.ts";
import { plainName } from "./plainText.ts";
import { remainderSentence } from "./remainder.ts";
import type { Speech } from "./speech.ts";

/** One line of the account of a series; the larger the rank, the sooner it is given up for want of room. */
export interface RankedLine {
  readonly rank: number;
  readonly text: string;
}

/** The order in which room is given: what to expect and what changed before what it rests on. */
export const rank = {
  next: 0,
  change: 1,
  news: 1,
  meaning: 2,
  chance: 3,
  when: 4,
  total: 5,
  small: 6,
} as const;

/** All that the business note could say of one series, in reading order; `label` names it at the start of each line. */
export function seriesLines(speech: Speech, label: string): RankedLine[] {
  const lines: RankedLine[] = [...expected(speech, label)];
  for (const finding of speech.facts.findings) {
    for (const [at, text] of said(finding, speech)) lines.push({ rank: at, text: sentence(label, text) });
  }
  for (const text of chanceSentences(speech)) lines.push({ rank: rank.chance, text: sentence(label, text) });
  return lines;
}

/** The next period, the total and the small bars, on one line where they fit, else without bars, else on two. */
function expected(speech: Speech, label: string): RankedLine[] {
  const next = nextSentence(speech);
  const total = totalSentence(speech);
  if (total === "") return [{ rank: rank.next, text: `${sentence(label, next)} ${bars(speech)}` }];
  const both = sentence(label, `${next}, ${total}`);
  const drawn = `${both} ${bars(speech)}`;
  if (fits(drawn)) return [{ rank: rank.next, text: drawn }];
  if (fits(both)) return [{ rank: rank.next, text: both }];
  return [
    { rank: rank.next, text: sentence(label, next) },
    { rank: rank.total, text: sentence(label, total) },
  ];
}

function said(finding: Finding, speech: Speech): [number, string][] {
  const line = (at: number, text: string | null): [number, string][] => (text ? [[at, text]] : []);
  switch (finding.code) {
    case "change": {
      if (!finding.fresh) return [];
      const rest = finding.kind === "persistence" ? remainderSentence(speech, finding) : null;
      const meaning = [changeMeaning(finding, speech), rest].filter((one) => one !== null && one !== "");
      return [
        ...line(rank.change, changeHeadline(finding, speech)),
        ...line(rank.meaning, meaning.join("; ")),
        ...line(rank.when, changeDate(finding, speech)),
      ];
    }
    case "surprise":
      return [
        ...line(rank.news, surpriseSentence(finding, speech)),
        ...line(rank.meaning, surpriseRemainder(finding, speech)),
      ];
    case "stale":
      return line(rank.news, staleSentence(finding, speech));
    case "revised":
      return line(rank.small, revisedSentence(finding, speech));
    case "gaps":
      return isRecent(finding.latest, speech) ? line(rank.small, gapsSentence(finding, speech)) : [];
    case "event-effect":
      return line(rank.chance, comingEventSentence(finding, plainName(finding.name, 40), speech));
    case "forecast-note":
      return forAnalysts.has(finding.note.code)
        ? []
        : line(rank.small, forecastNoteSentence(finding, speech));
    default:
      return [];
  }
}

/** Decisions of the forecaster that change nothing for whoever plans with its numbers. */
const forAnalysts = new Set(["outliers-damped", "level-step", "naive-used", "zeros-first"]);

/** Within the periods that the small bars show. */
function isRecent(start: string, { facts }: Speech): boolean {
  return start > periodStart(facts.lastPeriod, facts.period, -barsPast);
}
