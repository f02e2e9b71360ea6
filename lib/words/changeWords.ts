import type { ChangeKind } from "../drift/notice.ts";
import type { Finding, SeriesFacts } from "./facts.ts";
import { isToldFirst } from "./freshness.ts";
import { roundTo, significantStep } from "./numbers.ts";
import { remainderOf } from "./remainder.ts";
import { anOrA } from "./spans.ts";
import type { Speech } from "./speech.ts";

export type ChangeFinding = Extract<Finding, { code: "change" }>;

/** The newest change of persistence that the series still has on record. */
export function lastPersistenceChange(facts: SeriesFacts): ChangeFinding | null {
  const changes = facts.findings
    .filter((one) => one.code === "change")
    .filter((one) => one.kind === "persistence");
  return changes.reduce<ChangeFinding | null>(
    (newest, one) => (newest === null || one.change.period > newest.change.period ? one : newest),
    null,
  );
}

/** What each kind of change is called when a sentence names it as a possibility. */
export const kindNames: Record<ChangeKind, string> = {
  persistence: "how fast shocks fade",
  level: "the usual level",
  trend: "the trend",
  "shock-size": "the size of surprises",
  season: "the repeating pattern",
};

/** Up, down or the same, for a pair told to the same rounding. */
export function direction(before: number, after: number): "up" | "down" | "same" {
  return after > before ? "up" : after < before ? "down" : "same";
}

/** Half-lives told in words, with the direction in which fading moved; `null` stands for never. */
function fadingWords(finding: ChangeFinding, speech: Speech): string {
  const { before, after } = { before: finding.before.halfLife, after: finding.after.halfLife };
  if (after === null && before === null) {
    return "shocks do not fade, neither before nor now, but they now build up differently";
  }
  if (after === null)
    return `shocks no longer fade; before, they lost half their effect in ${speech.span(before ?? 0)}`;
  if (before === null)
    return `shocks now fade, losing half their effect in ${speech.span(after)}; before, they did not fade`;
  const now = speech.span(after);
  const was = speech.span(before);
  if (now !== was) return `shocks now lose half their effect in ${now}; it was ${shortened(was, now)}`;
  const moved = direction(before, after);
  const how =
    moved === "up" ? "a little more slowly" : moved === "down" ? "a little faster" : "in another way";
  return `shocks now fade ${how} than before, still losing half their effect in ${now}`;
}

/** "about 2 weeks" as "2" where "weeks" has just been said, else as "2 weeks". */
function shortened(was: string, now: string): string {
  const noun = now.split(" ").at(-1) ?? "";
  const plain = was.replace(/^about /, "");
  return noun.endsWith("s") && plain.endsWith(` ${noun}`) ? plain.slice(0, -noun.length - 1) : plain;
}

/** Two amounts with enough digits to tell them apart, where two digits would hide the difference. */
function pair(before: number, after: number, speech: Speech): readonly [string, string] {
  const step = (digits: number) =>
    Math.min(significantStep(before, digits, false), significantStep(after, digits, false));
  const digits = [2, 3, 4, 5].find((one) => roundTo(before, step(one)) !== roundTo(after, step(one))) ?? 2;
  return [speech.write(before, step(digits)), speech.amount(after, step(digits))];
}

function slopeWords(slope: number, speech: Speech): string {
  const size = `about ${speech.amount(Math.abs(slope), significantStep(slope, 2, false))} ${anOrA(speech.facts.period)} ${speech.facts.period}`;
  return slope > 0 ? `rises by ${size}` : slope < 0 ? `falls by ${size}` : "stays flat";
}

/** Ratios this near to one are not told as a difference. */
const aboutEqual = 0.005;

/** "about twice as large", "about 1.5 times as large", "about 40% smaller". */
function ratioWords(ratio: number, speech: Speech): string {
  if (!Number.isFinite(ratio)) return "larger";
  if (Math.abs(ratio - 1) < aboutEqual) return "about as large as before";
  if (ratio >= 1.95 && ratio <= 2.05) return "about twice as large";
  if (ratio >= 1.5) return `about ${speech.write(ratio, ratio < 10 ? 0.1 : 1)} times as large`;
  if (ratio >= 1) return `about ${speech.percent(Math.round((ratio - 1) * 100))} larger`;
  return `about ${speech.percent(Math.min(99, Math.round((1 - ratio) * 100)))} smaller`;
}

/** The headline of a lasting change, in words a counter or a shop uses; without the name of the series. */
export function changeHeadline(finding: ChangeFinding, speech: Speech): string {
  const again = !isToldFirst(finding, speech.facts);
  const doubts = [
    ...(finding.lookedBack
      ? ["found looking back"]
      : again
        ? [`first seen ${speech.periods.when(finding.noticed)}`]
        : []),
    ...(finding.status === "provisional" ? ["an early sign"] : again ? ["now confirmed"] : []),
    ...(finding.alternative ? [`it may instead be ${kindNames[finding.alternative]}`] : []),
  ];
  return `${changeWords(finding, speech)}${doubts.length > 0 ? ` (${doubts.join("; ")})` : ""}`;
}

function changeWords(finding: ChangeFinding, speech: Speech): string {
  const { before, after } = finding;
  const { period } = speech.facts;
  switch (finding.kind) {
    case "persistence":
      return fadingWords(finding, speech);
    case "level": {
      const [was, is] = pair(before.level, after.level, speech);
      const moved = direction(before.level, after.level);
      const word = moved === "up" ? "is higher" : moved === "down" ? "is lower" : "hardly moved";
      return `the usual level ${word}: about ${is} ${anOrA(period)} ${period} now, ${was} before`;
    }
    case "trend":
      return `the trend changed: it now ${slopeWords(after.slope, speech)}; before, it ${past(slopeWords(before.slope, speech))}`;
    case "shock-size": {
      const [was, is] = pair(before.shockSize, after.shockSize, speech);
      return `surprises are ${ratioWords(after.shockSize / before.shockSize, speech)}: typically ${is} now, ${was} before`;
    }
    case "season":
      return "the repeating pattern over the season changed";
  }
}

const past = (words: string) =>
  words
    .replace(/^rises/, "rose")
    .replace(/^falls/, "fell")
    .replace(/^stays/, "stayed");

/** What a lasting change means for whoever plans with the figures; empty when there is nothing to add. */
export function changeMeaning(finding: ChangeFinding, speech: Speech): string {
  const { period } = speech.facts;
  const before = finding.before.halfLife ?? Number.POSITIVE_INFINITY;
  const after = finding.after.halfLife ?? Number.POSITIVE_INFINITY;
  switch (finding.kind) {
    case "persistence":
      if (after === before) return "";
      return `${unusual(finding, speech)} ${period} now ${after > before ? "stays with you longer" : "passes sooner"}`;
    case "level":
      return "plan around the new level, not around last year's figures";
    case "trend":
      return "plan along the new trend";
    case "shock-size":
      if (Math.abs(finding.after.shockSize / finding.before.shockSize - 1) < aboutEqual) return "";
      return finding.after.shockSize > finding.before.shockSize
        ? "keep more in reserve than before"
        : "less reserve is needed than before";
    case "season":
      return "lean less on the same time last season";
  }
}

/** The latest shock tells which sort of period is on the reader's mind. */
function unusual({ after }: ChangeFinding, { facts }: Speech): string {
  const shock = remainderOf(facts, after.coefficients)?.shock ?? 0;
  return shock > 0 ? "a busy" : shock < 0 ? "a quiet" : "a busy or quiet";
}

/** When it happened and how sure that is: "since about the week of 21 September (between … and …)". */
export function changeDate({ change }: ChangeFinding, speech: Speech): string {
  const { inText } = speech.periods;
  const range =
    change.low === change.high ? "" : ` (between ${inText(change.low)} and ${inText(change.high)})`;
  return `since about ${inText(change.period)}${range}`;
}
