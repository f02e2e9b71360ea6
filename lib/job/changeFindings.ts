import type { ChangeNotice, Notice, SurpriseNotice } from "../drift/notice.ts";
import type { Finding } from "../words/facts.ts";

type ChangeFinding = Extract<Finding, { code: "change" }>;
type SurpriseFinding = Extract<Finding, { code: "surprise" }>;

/**
 * Periods after its notice that a change is told (eight looks until it is confirmed, and as long again), and that it is
 * kept on record.
 */
const toldFor = 16;
const keptFor = 26;
/** How long a surprise is spoken of, while what is left of it still matters. */
const surpriseToldFor = 3;
/** Outlook of a surprise: what is left after so many periods. */
const outlook = [1, 4, 12];

/** What turns indexes into periods and shocks into what is left of them. */
export interface FindingContext {
  readonly periodOf: (index: number) => string;
  readonly indexOf: (period: string) => number;
  /** Index of the newest value. */
  readonly newest: number;
  /** Index of the first value that no earlier run saw; without an earlier run the newest, all before being the past. */
  readonly firstNew: number;
  /** ψ weights of the describing model, as far as the outlook reaches. */
  readonly weights: ArrayLike<number>;
}

function changeFinding(notice: ChangeNotice, context: FindingContext): ChangeFinding {
  const { noticedAt, change, ...rest } = notice;
  return {
    ...rest,
    fresh: true,
    noticed: context.periodOf(noticedAt),
    ...(noticedAt < context.firstNew ? { lookedBack: true } : {}),
    change: {
      period: context.periodOf(change.index),
      low: context.periodOf(change.low),
      high: context.periodOf(change.high),
    },
  };
}

function surpriseFinding(notice: SurpriseNotice, context: FindingContext): SurpriseFinding {
  const { index, ...rest } = notice;
  const shock = notice.value - notice.expected;
  const remaining = outlook
    .filter((after) => after < context.weights.length)
    .map((after) => ({
      after,
      period: context.periodOf(index + after),
      amount: shock * context.weights[after],
    }));
  return { ...rest, period: context.periodOf(index), remaining };
}

/**
 * What the drift room found, with what earlier runs found and is still worth saying. A confirmed change takes the
 * place of its provisional notice, and was noticed in time if that was.
 */
export function changeFindings(
  notices: readonly Notice[],
  earlier: readonly Finding[],
  context: FindingContext,
): Finding[] {
  const age = (period: string) => context.newest - context.indexOf(period);
  const made = notices.map((notice) =>
    notice.code === "change"
      ? asFirstTold(changeFinding(notice, context), earlier)
      : surpriseFinding(notice, context),
  );
  const confirmed = noticesOf(
    made.filter((finding) => finding.code === "change" && finding.status === "confirmed"),
  );
  const superseded = (finding: Finding) =>
    finding.code === "change" && finding.status === "provisional" && confirmed.has(finding.noticed);
  return [...made, ...earlier].flatMap((finding): Finding[] => {
    if (finding.code === "surprise") return age(finding.period) <= surpriseToldFor ? [finding] : [];
    if (finding.code !== "change" || superseded(finding) || age(finding.noticed) > keptFor) return [];
    return [{ ...finding, fresh: age(finding.noticed) <= toldFor }];
  });
}

/** A change that an earlier run has told already, as it was told then: in time, or looking back. */
function asFirstTold(finding: ChangeFinding, earlier: readonly Finding[]): ChangeFinding {
  const told = earlier.find((one) => one.code === "change" && one.noticed === finding.noticed);
  if (told?.code !== "change") return finding;
  const { lookedBack: _lookedBack, ...rest } = finding;
  return told.lookedBack ? { ...rest, lookedBack: true } : rest;
}

/** The periods in which changes were noticed: they tell changes of one series apart. */
function noticesOf(findings: readonly Finding[]): Set<string> {
  return new Set(findings.flatMap((finding) => (finding.code === "change" ? [finding.noticed] : [])));
}
