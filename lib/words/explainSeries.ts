import { changeDate, changeHeadline } from "./changeWords.ts";
import type { SeriesFacts, Voice } from "./facts.ts";
import { nextSentence, sparkSentence, totalSentence } from "./forecastSentences.ts";
import { caution } from "./note.ts";
import { plainName } from "./plainText.ts";
import { seriesAccount } from "./seriesAccount.ts";
import { speechFor } from "./speech.ts";
import { statisticsWriter } from "./statistics.ts";

/** The whole account of one series for a terminal, section by section, past changes included. */
export function explainSeries(table: string, facts: SeriesFacts, voice: Voice): string[] {
  const speech = speechFor(facts, voice);
  const account = seriesAccount(facts, speech, statisticsWriter(voice.locale), voice, false);
  const total = totalSentence(speech);
  const forecast = [nextSentence(speech), ...(total === "" ? [] : [total])].map((one) => `${capital(one)}.`);
  const headlines = facts.findings.flatMap((one) =>
    one.code === "change" ? [`${capital(changeHeadline(one, speech))}; ${changeDate(one, speech)}.`] : [],
  );
  const section = (title: string, lines: readonly string[]) =>
    lines.length > 0 ? ["", title, ...lines.map((line) => `  ${line}`)] : [];
  return [
    `${plainName(table)}, ${speech.series}${speech.unit === null ? "" : `, in ${speech.unit}`}`,
    ...section("What to expect", [...forecast, sparkSentence(speech, 24)]),
    ...section("What changed", [...headlines, ...account.changes]),
    ...section("Also worth knowing", account.others),
    ...section("The model", account.model),
    ...section("Compared with before", account.comparison),
    ...section("The watch for change", account.watch),
    ...section("Track record", account.record),
    "",
    caution,
  ];
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);
