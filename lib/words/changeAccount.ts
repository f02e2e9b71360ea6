import { percentWriter } from "./chances.ts";
import { type ChangeFinding, kindNames } from "./changeWords.ts";
import type { SeriesFacts } from "./facts.ts";
import type { Speech } from "./speech.ts";
import type { Statistics } from "./statistics.ts";
import { textTable } from "./textTable.ts";

const technical = {
  persistence: "persistence",
  level: "level",
  trend: "trend",
  "shock-size": "shock size",
  season: "season",
} as const;

/** A change as an analyst needs it: kind, date with interval, both behaviours, evidence, and what it does not say. */
export function changeAccount(finding: ChangeFinding, speech: Speech, tell: Statistics): string[] {
  const { change, evidence, before, after, alternative } = finding;
  const name = speech.periods.name;
  const life = (value: number | null) => (value === null ? "infinite" : tell.size(value));
  const percent = speech.percent(evidence.falseAlarmRate * 100);
  return [
    `Change of ${technical[finding.kind]}, ${finding.status}, ${noticedWords(finding, speech)}.`,
    alternative
      ? `Kind: ${technical[finding.kind]} or ${technical[alternative]}; both fit nearly as well (${kindNames[finding.kind]}, or ${kindNames[alternative]}).`
      : `Kind: ${technical[finding.kind]} (${kindNames[finding.kind]}); no other kind fits nearly as well.`,
    `Date: ${name(change.period)}; interval ${name(change.low)} to ${name(change.high)}.`,
    `${evidenceWords(finding, tell)}; a steady series gives any notice over all ${evidence.looks} looks with probability ${percent}.${judgedApart(finding)}`,
    ...(evidence.caution === "clustered-shocks"
      ? [
          "Caution: large shocks seem to have come in clusters before, too; false notices are then up to three times as frequent as that.",
        ]
      : []),
    ...textTable([
      ["", "before", "after"],
      ["order", `${before.order}`, `${after.order}`],
      ["persistence", tell.coefficient(before.persistence), tell.coefficient(after.persistence)],
      [`half-life, ${speech.facts.period}s`, life(before.halfLife), life(after.halfLife)],
      ["level", tell.size(before.level), tell.size(after.level)],
      [`slope a ${speech.facts.period}`, tell.size(before.slope), tell.size(after.slope)],
      ["shock size", tell.size(before.shockSize), tell.size(after.shockSize)],
      ["values", speech.write(before.observations, 1), speech.write(after.observations, 1)],
    ]),
    notSaid(finding, speech),
  ];
}

/** A change found in looking back was told by no run of the time at which its statistic passed. */
function noticedWords({ noticed, lookedBack }: ChangeFinding, speech: Speech): string {
  const when = speech.periods.when(noticed);
  return lookedBack
    ? `found looking back on the past, its statistic having passed ${when}`
    : `noticed ${when}`;
}

/** What the change was noticed by. An account of an earlier version holds, once confirmed, the numbers of that look alone. */
function evidenceWords({ evidence, status }: ChangeFinding, tell: Statistics): string {
  const { passed, looks, looksUsed } = evidence;
  const [statistic, boundary] = [tell.size(evidence.statistic), tell.size(evidence.boundary)];
  if (passed)
    return `Evidence: the ${technical[passed.kind]} statistic passed its boundary of ${boundary} with ${tell.size(passed.statistic)}, at look ${passed.look} of ${looks}`;
  return status === "provisional"
    ? `Evidence: statistic ${statistic} against a boundary of ${boundary}, at look ${looksUsed} of ${looks}`
    : `Evidence: when confirmed, at look ${looksUsed} of ${looks}, the statistic it was noticed by stood at ${statistic} against a boundary of ${boundary}`;
}

/** Any statistic may be the first to pass; what sort of change it is comes from what explains the values best. */
function judgedApart({ evidence, kind }: ChangeFinding): string {
  return evidence.passed && evidence.passed.kind !== kind
    ? " The kind is judged apart from that, by what explains the values best."
    : "";
}

function notSaid({ after, status }: ChangeFinding, speech: Speech): string {
  const few = `The numbers after rest on ${speech.write(after.observations, 1)} values and will move as more come.`;
  const sure =
    status === "provisional" ? " The kind is provisional: it is looked at again eight looks on." : "";
  return `Not said: why it changed, that it will last, or that nothing else changed at the same time. ${few}${sure}`;
}

/** The state of the watch: how many looks are used, and how near each statistic stands to its boundary. */
export function monitorLines(facts: SeriesFacts, speech: Speech, tell: Statistics, locale: string): string[] {
  const { monitor } = facts;
  if (!monitor) return ["Watch: none yet; it starts when there are enough values for a reference."];
  const state = {
    watching: "watching",
    relearning: "relearning after a change: no notices until the new behaviour is known",
    "waiting-for-data": "waiting for data",
  }[monitor.state];
  const rate = percentWriter(locale)(monitor.falseAlarmRate * 100);
  const paths = monitor.paths.map(({ kind, boundary, statistics }) => {
    const last = statistics.findLast((value) => value !== null) ?? null;
    return `${technical[kind]} ${last === null ? "–" : tell.size(last)} of ${tell.size(boundary)}`;
  });
  return [
    `Watch: ${state}; ${monitor.looksUsed} of ${monitor.looks} looks used since ${speech.periods.inText(monitor.since)}; false-alarm rate over all looks ${rate}.`,
    ...(paths.length > 0 ? [`Latest statistic against its boundary: ${paths.join("; ")}.`] : []),
  ];
}
