import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { ForecastNote } from "../../lib/forecast/forecast.ts";
import type { Finding, SeriesFacts } from "../../lib/words/facts.ts";
import {
  eventSentence,
  forecastNoteSentence,
  gapsSentence,
  pastBreakSentence,
  revisedSentence,
  staleSentence,
  surpriseRemainder,
  surpriseSentence,
} from "../../lib/words/otherFindings.ts";
import { speechFor } from "../../lib/words/speech.ts";
import { periodKind, seriesOf, signedSize, surpriseOf } from "../support/factsArbitrary.ts";
import { britishVoice, quay } from "../support/factsFixture.ts";
import { number, readNumber } from "../support/readSentence.ts";

const speech = speechFor(quay, britishVoice, "2026-12-07T06:00:00Z");
const surprised = periodKind.chain((period) =>
  fc.tuple(seriesOf(period, fc.constant([])), surpriseOf(period)),
);
const rough = (said: string, truth: number, whole: boolean) =>
  expect(Math.abs(readNumber(said) - truth)).toBeLessThanOrEqual(
    Math.max(whole ? 0.5 : 0, truth * 0.05) + 1e-9,
  );
const isWhole = ({ history }: SeriesFacts) =>
  history.values.every((value) => value === null || Number.isInteger(value));

describe("the sentence of a surprise", () => {
  it("says more or less as the value lay, by how much, and that it is not a lasting change", () => {
    fc.assert(
      fc.property(surprised, ([facts, finding]) => {
        const text = surpriseSentence(finding, speechFor(facts, britishVoice));
        const found = text.match(
          new RegExp(`^${number} loans? .*, about ${number} (more|less) than expected`),
        );
        expect(found, text).not.toBeNull();
        expect(Math.abs(readNumber(found?.[1] ?? "") - finding.value)).toBeLessThanOrEqual(
          Math.abs(finding.value) * 5e-6 + 1e-9,
        );
        expect(found?.[3]).toBe(finding.value >= finding.expected ? "more" : "less");
        rough(found?.[2] ?? "", Math.abs(finding.value - finding.expected), isWhole(facts));
        expect(text).toContain("not a lasting change");
      }),
      { numRuns: 1500 },
    );
  });

  it("tells what is left with the right sign, or that it will have faded", () => {
    fc.assert(
      fc.property(surprised, ([facts, finding]) => {
        const text = surpriseRemainder(finding, speechFor(facts, britishVoice));
        const small = 0.1 * Math.abs(finding.value - finding.expected);
        const [next, ...later] = finding.remaining;
        if (!next) {
          expect(text).toBeNull();
          return;
        }
        const found = text?.match(
          new RegExp(
            `(still adds|still takes off|followed by a rebound,|followed by a dip,) about ${number}`,
          ),
        );
        if (!found) {
          expect(text).toContain("all but faded");
          expect(Math.abs(next.amount)).toBeLessThan(small);
          return;
        }
        expect(text?.includes("all but faded")).toBe(later.some((one) => Math.abs(one.amount) < small));
        const up = next.amount > 0;
        const back = next.amount * (finding.value - finding.expected) < 0;
        const words = back
          ? `followed by a ${up ? "rebound" : "dip"},`
          : `still ${up ? "adds" : "takes off"}`;
        expect(found[1]).toBe(words);
        rough(found[2], Math.abs(next.amount), isWhole(facts));
      }),
      { numRuns: 1500 },
    );
  });
});

describe("what is left of an earlier surprise", () => {
  it("is told for the periods to come, not for those that have passed", () => {
    const remaining = [
      { after: 1, period: "2026-11-23", amount: 56 },
      { after: 4, period: "2026-12-14", amount: 27.3 },
      { after: 12, period: "2027-02-08", amount: -4.5 },
    ];
    const finding = {
      code: "surprise",
      period: "2026-11-16",
      value: 207,
      expected: 137,
      size: 7.5,
      remaining,
    } as const;
    expect(surpriseRemainder(finding, speech)).toBe(
      "if nothing else happens it still adds about 27 in the week of 14 December and has all but faded by the week of 8 February",
    );
  });
});

describe("the sentences of small matters", () => {
  it("count in the singular and the plural", () => {
    const largest = { period: "2026-11-09", before: 140, after: 152 };
    expect(revisedSentence({ code: "revised", count: 1, firstPeriod: "2026-11-09", largest }, speech)).toBe(
      "1 past figure was revised: week of 9 November, from 140 to 152 loans",
    );
    expect(revisedSentence({ code: "revised", count: 3, firstPeriod: "2026-10-19", largest }, speech)).toBe(
      "3 past figures were revised: the largest, week of 9 November, from 140 to 152 loans",
    );
    expect(gapsSentence({ code: "gaps", count: 1, latest: "2026-08-10" }, speech)).toBe(
      "1 week has no figure: week of 10 August",
    );
    expect(gapsSentence({ code: "gaps", count: 2, latest: "2026-08-10" }, speech)).toBe(
      "2 weeks have no figure, the latest week of 10 August",
    );
    expect(staleSentence({ code: "stale", lastPeriod: "2026-11-16", periodsLate: 1 }, speech)).toContain(
      "1 week late",
    );
  });

  it("tell a figure that came or went as such", () => {
    const finding: Finding = {
      code: "revised",
      count: 1,
      firstPeriod: "2026-11-09",
      largest: { period: "2026-11-09", before: null, after: 1 },
    };
    expect(revisedSentence(finding, speech)).toBe(
      "1 past figure was revised: week of 9 November, from no figure to 1 loan",
    );
  });

  it("place a past step by the index of the whole series, not of the tail that is shown", () => {
    // The series has 104 values, the last in the week of 30 November 2026; index 100 is three weeks before it.
    expect(
      forecastNoteSentence({ code: "forecast-note", note: { code: "level-step", index: 100 } }, speech),
    ).toBe(
      "for the forecast, figures before the week of 9 November count for less: the level may have stepped there",
    );
  });

  it("say that the last figures are the same, or all of them, and where a series began", () => {
    const tell = (note: ForecastNote) => forecastNoteSentence({ code: "forecast-note", note }, speech);
    const { observed } = speech.facts;
    expect(tell({ code: "constant", value: 7, observed })).toMatch(/^every figure so far is 7 loans, so/);
    expect(tell({ code: "constant", value: 7 })).toMatch(/^every figure so far is 7 loans, so/);
    expect(tell({ code: "constant", value: 7, observed: 12 })).toMatch(
      /^the last 12 figures are all 7 loans, so/,
    );
    expect(tell({ code: "zeros-first", index: 100 })).toBe(
      "for the forecast, the zeros before the week of 9 November are left out, as from before it began",
    );
  });

  it("tell an event's effect with its direction, and doubt it below two standard errors", () => {
    fc.assert(
      fc.property(signedSize, fc.double({ min: 0.1, max: 50, noNaN: true }), (effect, standardError) => {
        const text = eventSentence(
          { code: "event-effect", name: "fair", effect, standardError, coming: [] },
          "fair",
          speech,
        );
        expect(text.includes("adds")).toBe(effect > 0);
        expect(text.includes("could be chance")).toBe(Math.abs(effect) < 2 * standardError);
      }),
    );
  });

  it("tell a break of the past with both levels and its date", () => {
    const change = { period: "2025-03-03", low: "2025-02-10", high: "2025-04-07" };
    expect(
      pastBreakSentence(
        { code: "past-break", change, levelBefore: 151.4, levelAfter: 190.2, pValue: 0.002 },
        speech,
      ),
    ).toBe(
      "in the past the usual level moved from about 151 to about 190 loans, around the week of 3 March 2025",
    );
  });
});
