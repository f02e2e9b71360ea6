import { changeAccount, monitorLines } from "./changeAccount.ts";
import { lastPersistenceChange } from "./changeWords.ts";
import type { Finding, SeriesFacts, Voice } from "./facts.ts";
import { chanceSentences } from "./forecastSentences.ts";
import { dateWriter } from "./instants.ts";
import {
  coefficientLines,
  comparisonLines,
  diagnosticsLine,
  meaningLines,
  modelLine,
} from "./modelAccount.ts";
import {
  eventSentence,
  forecastNoteSentence,
  gapsSentence,
  incompleteSentence,
  noNewValuesSentence,
  pastBreakSentence,
  revisedSentence,
  staleSentence,
  surpriseRemainder,
  surpriseSentence,
} from "./otherFindings.ts";
import { plainName, plainText } from "./plainText.ts";
import { remainderSentence } from "./remainder.ts";
import type { Speech } from "./speech.ts";
import type { Statistics } from "./statistics.ts";
import { trackSentence } from "./trackSentence.ts";

/** The analyst's account of one series in parts: what changed, the model, the comparison, the watch, the record. */
export interface SeriesAccount {
  readonly changes: readonly string[];
  readonly others: readonly string[];
  readonly model: readonly string[];
  readonly comparison: readonly string[];
  readonly watch: readonly string[];
  readonly record: readonly string[];
}

/** All that can be said of a series to an analyst; `onlyFresh` leaves out changes told in earlier runs. */
export function seriesAccount(
  facts: SeriesFacts,
  speech: Speech,
  tell: Statistics,
  voice: Voice,
  onlyFresh: boolean,
): SeriesAccount {
  const changes = facts.findings.flatMap((finding) =>
    finding.code === "change" && (finding.fresh || !onlyFresh) ? changeAccount(finding, speech, tell) : [],
  );
  const remainder = remainderSentence(speech, lastPersistenceChange(facts) ?? undefined);
  return {
    changes,
    others: [
      ...facts.findings.flatMap((finding) => otherLines(finding, speech, tell)),
      ...(remainder ? [capital(`${remainder}.`)] : []),
      ...chanceSentences(speech).map((one) => capital(`${one}.`)),
    ],
    model: [
      modelLine(facts.model, speech, tell),
      ...meaningLines(facts.model, speech, tell),
      ...(facts.comparison ? [] : coefficientLines(facts.model, tell)),
      diagnosticsLine(facts.model, tell),
      ...candidateLine(facts, tell),
    ],
    comparison: facts.comparison
      ? comparisonLines(facts.comparison, dateWriter(voice)(facts.comparison.since), speech, tell)
      : [],
    watch: monitorLines(facts, speech, tell, voice.locale),
    record: [trackSentence([facts], voice), backTestLine(facts, speech, tell)].flatMap((one) =>
      one ? [one] : [],
    ),
  };
}

const capital = (text: string) => text.charAt(0).toUpperCase() + text.slice(1);

/** The heaviest members of the average that makes the forecast, and what the rest carry together. */
function candidateLine({ forecast }: SeriesFacts, tell: Statistics): string[] {
  const sorted = [...forecast.candidates].sort((one, other) => other.weight - one.weight);
  const [shown, rest] = [sorted.slice(0, 3), sorted.slice(3)];
  if (shown.length === 0) return [];
  const parts = shown.map(({ name, weight }) => `${plainText(name, 80)} (${tell.coefficient(weight)})`);
  const others = rest.reduce((sum, one) => sum + one.weight, 0);
  const more = rest.length > 0 ? `; ${rest.length} more carry ${tell.coefficient(others)}` : "";
  return [`Forecast from: ${parts.join("; ")}${more}.`];
}

function backTestLine({ backTest }: SeriesFacts, speech: Speech, tell: Statistics): string | null {
  if (backTest.relativeError === null) return null;
  const inside =
    backTest.coverage80 === null
      ? ""
      : `; ${speech.percent(Math.round(backTest.coverage80 * 100))} of values inside the 80% range`;
  return `On its own past (${backTest.origins} origins): error ${tell.coefficient(backTest.relativeError)} of the naive forecast's${inside}.`;
}

function otherLines(finding: Finding, speech: Speech, tell: Statistics): string[] {
  const line = (text: string | null) => (text === null ? [] : [capital(`${text}.`)]);
  switch (finding.code) {
    case "change":
      return [];
    case "surprise":
      return [
        ...line(
          `${surpriseSentence(finding, speech)} (${tell.size(Math.abs(finding.size))} one-step standard deviations)`,
        ),
        ...line(surpriseRemainder(finding, speech)),
      ];
    case "past-break": {
      const { low, high } = finding.change;
      const { name } = speech.periods;
      return line(
        `${pastBreakSentence(finding, speech)} (interval ${name(low)} to ${name(high)}; ${tell.pValue(finding.pValue)})`,
      );
    }
    case "forecast-note":
      return line(
        finding.note.code === "naive-used"
          ? `The naive forecast is used: the models' error on the past was ${tell.coefficient(finding.note.relativeError)} of its`
          : forecastNoteSentence(finding, speech),
      );
    case "no-new-values":
      return line(noNewValuesSentence(finding, speech));
    case "stale":
      return line(staleSentence(finding, speech));
    case "revised":
      return line(revisedSentence(finding, speech));
    case "incomplete-period":
      return line(incompleteSentence(finding, speech));
    case "gaps":
      return line(gapsSentence(finding, speech));
    case "event-effect":
      return line(
        `${eventSentence(finding, plainName(finding.name, 40), speech)} (standard error ${tell.size(finding.standardError)})`,
      );
  }
}
