import { describe, expect, it } from "vitest";
import type { Behaviour, ChangeNotice } from "../../lib/drift/notice.ts";
import { changeFindings } from "../../lib/job/changeFindings.ts";
import { periodIndex, periodStart } from "../../lib/series/periods.ts";

const start = "2026-01-05";
const behaviour: Behaviour = {
  order: 1,
  coefficients: [0.5],
  persistence: 0.5,
  halfLife: 1,
  level: 200,
  slope: 0,
  shockSize: 10,
  observations: 100,
};
const notice = (status: "provisional" | "confirmed", noticedAt: number): ChangeNotice => ({
  code: "change",
  kind: "persistence",
  alternative: null,
  status,
  noticedAt,
  change: { index: noticedAt - 6, low: noticedAt - 10, high: noticedAt - 3 },
  before: behaviour,
  after: behaviour,
  evidence: { statistic: 3, boundary: 2, looksUsed: 10, looks: 52, falseAlarmRate: 0.05 },
});
const context = (newest: number, firstNew = newest) => ({
  periodOf: (index: number) => periodStart(start, "week", index),
  indexOf: (period: string) => periodIndex(start, "week", period),
  newest,
  firstNew,
  weights: Array.from({ length: 13 }, (_, lag) => 0.5 ** lag),
});

describe("findings of change", () => {
  it("name indexes by their periods", () => {
    const [finding] = changeFindings([notice("provisional", 20)], [], context(20));
    expect(finding).toMatchObject({
      fresh: true,
      noticed: "2026-05-25",
      change: { period: "2026-04-13", low: "2026-03-16", high: "2026-05-04" },
    });
  });

  it("put the confirmed change in the place of its provisional notice, in one run or in two", () => {
    const both = changeFindings([notice("provisional", 20), notice("confirmed", 20)], [], context(28));
    expect(both).toMatchObject([{ status: "confirmed" }]);
    const first = changeFindings([notice("provisional", 20)], [], context(20));
    expect(changeFindings([notice("confirmed", 20)], first, context(28))).toMatchObject([
      { status: "confirmed" },
    ]);
  });

  it("tell a notice in a value that an earlier run saw, or in the past of a first run, as found looking back", () => {
    const lookedBack = (noticedAt: number, firstNew: number) =>
      changeFindings([notice("provisional", noticedAt)], [], context(28, firstNew)).map(
        (one) => one.code === "change" && one.lookedBack,
      );
    expect(lookedBack(20, 28)).toEqual([true]);
    expect(lookedBack(28, 28)).toEqual([undefined]);
    // Four values came at once, and the second of them brought the notice.
    expect(lookedBack(26, 25)).toEqual([undefined]);
  });

  it("keep with the confirmation whether the notice was found looking back", () => {
    const inTime = changeFindings([notice("provisional", 20)], [], context(20));
    const [confirmed] = changeFindings([notice("confirmed", 20)], inTime, context(28));
    expect(confirmed).not.toHaveProperty("lookedBack");
    const late = changeFindings([notice("provisional", 20)], [], context(22));
    expect(changeFindings([notice("confirmed", 20)], late, context(28))).toMatchObject([
      { status: "confirmed", lookedBack: true },
    ]);
  });

  it("tell a change for some weeks, keep it for half a year, and then let it go", () => {
    const told = changeFindings([notice("confirmed", 20)], [], context(28));
    expect(changeFindings([], told, context(32))).toMatchObject([{ fresh: true }]);
    expect(changeFindings([], told, context(40))).toMatchObject([{ fresh: false }]);
    expect(changeFindings([], told, context(60))).toEqual([]);
  });

  it("give a surprise's outlook from the weights: what is left after 1, 4 and 12 periods", () => {
    const surprise = { code: "surprise", index: 20, value: 264, expected: 200, size: 5 } as const;
    const [finding] = changeFindings([surprise], [], context(20));
    // A shock of 64 that halves every week leaves 32, 4 and 1/64.
    expect(finding).toMatchObject({
      period: "2026-05-25",
      remaining: [
        { after: 1, period: "2026-06-01", amount: 32 },
        { after: 4, period: "2026-06-22", amount: 4 },
        { after: 12, period: "2026-08-17", amount: 64 / 4096 },
      ],
    });
    expect(changeFindings([], [finding], context(24))).toEqual([]);
  });
});
