import { newsFrom, ranked } from "./attention.ts";
import type { RunFacts, Voice } from "./facts.ts";
import { falseNotices } from "./falseNotices.ts";
import { headline } from "./headline.ts";
import { reportPlace } from "./instants.ts";
import { messageData } from "./messageData.ts";
import { footerOf, type Note } from "./note.ts";
import { plainName } from "./plainText.ts";
import { seriesAccount } from "./seriesAccount.ts";
import { speechFor } from "./speech.ts";
import { statisticsWriter } from "./statistics.ts";
import { troubleLines } from "./troubleLines.ts";

/** Series told in full; the others are counted and stand in the report. */
const inFull = 6;

/** The notice for those who judge the method: every number a change was called by, and what it does not say. */
export function analystMessage(run: RunFacts, voice: Voice): Note {
  const all = ranked(run);
  const news = all.filter((one) => one.attention >= newsFrom);
  const tell = statisticsWriter(voice.locale);
  const lines = news.slice(0, inFull).flatMap(({ table, facts }) => {
    const speech = speechFor(facts, voice, run.asOf);
    const account = seriesAccount(facts, speech, tell, voice, true);
    const parts =
      account.changes.length > 0
        ? [...account.changes, ...account.others, ...account.model, ...account.comparison]
        : [...account.others, account.model[0]];
    return [`${plainName(table.table)}, ${speech.series}`, ...parts.map((one) => `  ${one}`)];
  });
  const untold = run.untold ?? { steady: 0, news: 0 };
  const rest = all.length - Math.min(news.length, inFull) + untold.steady + untold.news;
  return {
    title: `${headline(run)} (analyst's notice)`,
    lines: [
      ...lines,
      ...(rest > 0
        ? [
            `${lines.length > 0 ? "… and " : ""}${rest} more series: ${restWords(news.length + untold.news, rest)}`,
          ]
        : []),
      ...troubleLines(run),
      falseNotices(run, voice),
    ],
    footer: footerOf(reportPlace(run.asOf, voice)),
    data: messageData(run, "analyst", all),
  };
}

function restWords(news: number, rest: number): string {
  const untold = Math.max(0, news - inFull);
  return untold === 0
    ? "nothing to report."
    : `${untold} with news that stand in the report, ${rest - untold} steady.`;
}
