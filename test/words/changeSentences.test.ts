import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { businessMessage } from "../../lib/words/businessMessage.ts";
import type { ChangeFinding } from "../../lib/words/changeWords.ts";
import type { SeriesFacts } from "../../lib/words/facts.ts";
import { changeOf, periodKind, seriesOf } from "../support/factsArbitrary.ts";
import { britishVoice, loansRun, quay } from "../support/factsFixture.ts";
import { quayChange } from "../support/findingsFixture.ts";
import { number, readNumber } from "../support/readSentence.ts";

// Each sentence is read back with a pattern of its own and compared with the finding it was made from.

const told = (facts: SeriesFacts): string =>
  businessMessage({ ...loansRun, tables: [{ table: "loans", series: [facts], problems: [] }] }, britishVoice)
    .lines.join(" ")
    .replaceAll(" Quay: … ", " ")
    .replaceAll(/\s+/g, " ");

const changed = periodKind.chain((period) =>
  seriesOf(
    period,
    changeOf(period).map((one) => [one]),
  ),
);
const cases = (kind: ChangeFinding["kind"]) =>
  changed.filter((facts) => (facts.findings[0] as ChangeFinding).kind === kind);
const findingOf = (facts: SeriesFacts) => facts.findings[0] as ChangeFinding;
/** Two significant digits may be wrong by one twentieth. */
const twoDigits = (said: string, truth: number) => {
  const value = readNumber(said);
  expect(Math.abs(value - truth)).toBeLessThanOrEqual(Math.abs(truth) * 0.05 + 1e-9);
};
const spanned = (said: string, truth: number) => {
  const tolerance = truth < 3 ? 0.25 : truth < 20 ? 0.5 : 2.5;
  if (said.startsWith("less than")) expect(truth).toBeLessThan(0.75);
  else expect(Math.abs(readNumber(said) - truth)).toBeLessThanOrEqual(tolerance + 1e-9);
};

describe("the sentence of a change", () => {
  it("of persistence tells both half-lives and the direction of fading truly", () => {
    fc.assert(
      fc.property(cases("persistence"), (facts) => {
        const { before, after } = findingOf(facts);
        const text = told(facts);
        const pair = text.match(
          new RegExp(
            `now lose half their effect in (?:about ${number}|(less than an? \\w+))[^;]*; it was (?:about )?(?:${number}|(less than an? \\w+))`,
          ),
        );
        const same = text.match(/shocks now fade (a little more slowly|a little faster|in another way)/);
        if (before.halfLife === null && after.halfLife === null)
          expect(text).toContain("neither before nor now");
        else if (after.halfLife === null) expect(text).toContain("shocks no longer fade; before,");
        else if (before.halfLife === null)
          expect(text).toMatch(/shocks now fade, losing half .* before, they did not fade/);
        else if (same) {
          const truth = {
            slowly: after.halfLife > before.halfLife,
            faster: after.halfLife < before.halfLife,
          };
          if (same[1].endsWith("slowly")) expect(truth.slowly).toBe(true);
          else if (same[1].endsWith("faster")) expect(truth.faster).toBe(true);
          else expect(after.halfLife).toBe(before.halfLife);
          expect(Math.abs(after.halfLife - before.halfLife)).toBeLessThanOrEqual(5);
        } else {
          expect(pair, text).not.toBeNull();
          spanned(pair?.[1] ?? pair?.[2] ?? "", after.halfLife);
          spanned(pair?.[3] ?? pair?.[4] ?? "", before.halfLife);
        }
        const longer = (after.halfLife ?? Infinity) > (before.halfLife ?? Infinity);
        if (/stays with you longer/.test(text)) expect(longer).toBe(true);
        if (/passes sooner/.test(text))
          expect((after.halfLife ?? Infinity) < (before.halfLife ?? Infinity)).toBe(true);
      }),
      { numRuns: 2000 },
    );
  });

  it("of the level says higher only when it is higher, and both levels to two digits or better", () => {
    fc.assert(
      fc.property(cases("level"), (facts) => {
        const { before, after } = findingOf(facts);
        const found = told(facts).match(
          new RegExp(
            `the usual level (is higher|is lower|hardly moved): about ${number} loans? an? \\w+ now, ${number} before`,
          ),
        );
        expect(found, told(facts)).not.toBeNull();
        const words = { "1": "is higher", "-1": "is lower", "0": "hardly moved" };
        expect(found?.[1]).toBe(words[`${Math.sign(after.level - before.level)}` as keyof typeof words]);
        twoDigits(found?.[2] ?? "", after.level);
        twoDigits(found?.[3] ?? "", before.level);
        // The two numbers differ in the same direction as the truth.
        const [is, was] = [readNumber(found?.[2] ?? ""), readNumber(found?.[3] ?? "")];
        expect(Math.sign(is - was) * Math.sign(after.level - before.level)).not.toBe(-1);
      }),
      { numRuns: 1500 },
    );
  });

  it("of the trend tells rise, fall or rest, then and now", () => {
    const words = `(rises|rose|falls|fell|stays flat|stayed flat)(?: by about ${number} loans? an? \\w+)?`;
    const sides: Record<string, number> = {
      rises: 1,
      rose: 1,
      falls: -1,
      fell: -1,
      "stays flat": 0,
      "stayed flat": 0,
    };
    fc.assert(
      fc.property(cases("trend"), (facts) => {
        const { before, after } = findingOf(facts);
        const found = told(facts).match(new RegExp(`it now ${words}; before, it ${words}`));
        expect(found, told(facts)).not.toBeNull();
        expect(sides[found?.[1] ?? ""]).toBe(Math.sign(after.slope));
        expect(sides[found?.[3] ?? ""]).toBe(Math.sign(before.slope));
        if (after.slope !== 0) twoDigits(found?.[2] ?? "", Math.abs(after.slope));
        if (before.slope !== 0) twoDigits(found?.[4] ?? "", Math.abs(before.slope));
      }),
      { numRuns: 1500 },
    );
  });

  it("of the shock size tells the ratio and both sizes, and asks for more reserve only when it grew", () => {
    fc.assert(
      fc.property(cases("shock-size"), (facts) => {
        const { before, after } = findingOf(facts);
        const text = told(facts);
        const found = text.match(
          new RegExp(
            `surprises are about (?:(twice) as large|${number} times as large|${number}% (larger|smaller)|(as large as before)): typically ${number} loans? now, ${number} before`,
          ),
        );
        expect(found, text).not.toBeNull();
        const [, twice, times, percent, word, same, is, was] = found ?? [];
        const ratio = after.shockSize / before.shockSize;
        if (twice) expect(Math.abs(ratio - 2)).toBeLessThanOrEqual(0.05);
        else if (times)
          expect(Math.abs(readNumber(times) - ratio)).toBeLessThanOrEqual(
            ratio < 10 ? 0.051 : ratio < 1e9 ? 0.51 : ratio * 0.005,
          );
        else if (same) expect(Math.abs(ratio - 1)).toBeLessThanOrEqual(0.005);
        else {
          const said = 1 + (word === "larger" ? 1 : -1) * (readNumber(percent) / 100);
          expect(Math.abs(said - ratio)).toBeLessThanOrEqual(0.0101);
        }
        twoDigits(is, after.shockSize);
        twoDigits(was, before.shockSize);
        expect(/keep more in reserve/.test(text)).toBe(!same && after.shockSize > before.shockSize);
        expect(/less reserve is needed/.test(text)).toBe(!same && after.shockSize < before.shockSize);
      }),
      { numRuns: 1500 },
    );
  });

  it("says when it is an early sign, and names the other kind when two fit nearly as well", () => {
    const names: Record<string, string> = {
      persistence: "how fast shocks fade",
      level: "the usual level",
      trend: "the trend",
      "shock-size": "the size of surprises",
      season: "the repeating pattern",
    };
    fc.assert(
      fc.property(changed, (facts) => {
        const { status, alternative } = findingOf(facts);
        const text = told(facts);
        expect(text.includes("an early sign")).toBe(status === "provisional");
        expect(text.includes("it may instead be")).toBe(alternative !== null);
        if (alternative) expect(text).toContain(`it may instead be ${names[alternative]}`);
      }),
      { numRuns: 500 },
    );
  });

  it("told again in later runs says since when, and whether it is confirmed by now", () => {
    const later = (status: "provisional" | "confirmed") =>
      told({ ...quay, findings: [{ ...quayChange, noticed: "2026-10-05", status }] });
    expect(later("confirmed")).toContain("it was 2 (first seen in the week of 5 October; now confirmed).");
    expect(later("provisional")).toContain("it was 2 (first seen in the week of 5 October; an early sign).");
  });
});
