import { changeCaveats, changeHeadline, changeMeaning } from "./changeWords.ts";
import type { Finding } from "./facts.ts";
import { chanceSentences, nextSentence, sparkSentence, totalSentence } from "./forecastSentences.ts";
import { sentence } from "./lineWidth.ts";
import {
  forecastNoteSentence,
  gapsSentence,
  revisedSentence,
  staleSentence,
  surpriseRemainder,
  surpriseSentence,
} from "./otherFindings.ts";
import { remainderSentence } from "./remainder.ts";
import type { Speech } from "./speech.ts";

/** One line of the account of a series; the smaller the rank, the later it is given up for want of room. */
export interface RankedLine {
  readonly rank: number;
  readonly text: string;
}

const rank = {
  next: 0,
  change: 1,
  news: 2,
  meaning: 3,
  chance: 4,
  total: 5,
  spark: 6,
  when: 7,
  small: 8,
} as const;

/** All that the business note could say of one series, in reading order; `label` names it at the start of each line. */
export function seriesLines(speech: Speech, label: string): RankedLine[] {
  const next = nextSentence(speech);
  const total = totalSentence(speech);
  const both = sentence(label, total === "" ? next : `${next}; ${total}`);
  const lines: RankedLine[] = [];
  const add = (at: number, text: string | null) => {
    if (text !== null && text !== "") lines.push({ rank: at, text: sentence(label, text) });
  };
  if ([...both].length <= 160) lines.push({ rank: rank.next, text: both });
  else {
    add(rank.next, next);
    add(rank.total, total);
  }
  for (const finding of speech.facts.findings) findingLines(finding, speech, add);
  for (const chance of chanceSentences(speech)) add(rank.chance, chance);
  add(rank.spark, sparkSentence(speech));
  return lines;
}

function findingLines(
  finding: Finding,
  speech: Speech,
  add: (at: number, text: string | null) => void,
): void {
  if (finding.code === "change") {
    if (!finding.fresh) return;
    add(rank.change, changeHeadline(finding, speech));
    const meaning = changeMeaning(finding, speech);
    const rest = finding.kind === "persistence" ? remainderSentence(speech) : null;
    add(rank.meaning, meaning !== "" && rest ? `${meaning}: ${rest}` : meaning || rest);
    add(rank.when, changeCaveats(finding, speech));
  } else if (finding.code === "surprise") {
    add(rank.news, surpriseSentence(finding, speech));
    add(rank.meaning, surpriseRemainder(finding, speech));
  } else if (finding.code === "stale") add(rank.news, staleSentence(finding, speech));
  else if (finding.code === "revised") add(rank.small, revisedSentence(finding, speech));
  else if (finding.code === "gaps") add(rank.small, gapsSentence(finding, speech));
  else if (finding.code === "forecast-note") add(rank.small, forecastNoteSentence(finding, speech));
}
