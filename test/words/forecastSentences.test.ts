import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { SeriesFacts } from "../../lib/words/facts.ts";
import { chanceSentences, nextSentence, totalSentence } from "../../lib/words/forecastSentences.ts";
import { remainderSentence } from "../../lib/words/remainder.ts";
import { speechFor } from "../../lib/words/speech.ts";
import { periodKind, seriesOf } from "../support/factsArbitrary.ts";
import { branchFacts, britishVoice, quay } from "../support/factsFixture.ts";
import { quayChange } from "../support/findingsFixture.ts";
import { number, readNumber } from "../support/readSentence.ts";

const steady = periodKind.chain((period) => seriesOf(period, fc.constant([])));
const speech = (facts: SeriesFacts) => speechFor(facts, britishVoice);
/** Within a twentieth of the width of the range, within half a unit for whole numbers, or to three digits. */
const near = (said: string, truth: number, width: number) => {
  const value = readNumber(said);
  const room = Math.max(width / 20, 0.5, Math.abs(truth) >= 1e9 ? Math.abs(truth) / 200 : 0);
  expect(Math.abs(value - truth)).toBeLessThanOrEqual(room * (1 + 1e-9));
};

describe("the sentence of the forecast", () => {
  it("moves no number by more than a twentieth of its range", () => {
    fc.assert(
      fc.property(steady, (facts) => {
        const { point, intervals, total } = facts.forecast;
        const [{ low, high }] = intervals;
        const text = nextSentence(speech(facts));
        const found = text.match(new RegExp(`^about ${number} loans? .* \\(${number} to ${number}\\)$`));
        expect(found, text).not.toBeNull();
        near(found?.[1] ?? "", point[0], high[0] - low[0]);
        near(found?.[2] ?? "", low[0], high[0] - low[0]);
        near(found?.[3] ?? "", high[0], high[0] - low[0]);
        const sum = totalSentence(speech(facts));
        if (point.length === 1) {
          expect(sum).toBe("");
          return;
        }
        const parts = sum.match(
          new RegExp(`^about ${number} over all (\\d+) \\w+s \\(${number} to ${number}\\)$`),
        );
        expect(parts, sum).not.toBeNull();
        const [range] = total.intervals;
        near(parts?.[1] ?? "", total.point, range.high - range.low);
        expect(Number(parts?.[2])).toBe(point.length);
        near(parts?.[3] ?? "", range.low, range.high - range.low);
        near(parts?.[4] ?? "", range.high, range.high - range.low);
      }),
      { numRuns: 2000 },
    );
  });

  it("never tells a part of a loan where all past figures are whole", () => {
    fc.assert(
      fc.property(steady, (facts) => {
        fc.pre(facts.history.values.every((value) => value === null || Number.isInteger(value)));
        expect(nextSentence(speech(facts))).not.toMatch(/\d\.\d(?!\d* (?:b|tr)illion)/);
      }),
    );
  });

  it("tells a chance to the nearest five percent, and to one percent near none and near sure", () => {
    fc.assert(
      fc.property(steady, (facts) => {
        const [{ any }] = facts.forecast.chances;
        const found = chanceSentences(speech(facts))[0].match(
          /^(about|under|over) (\d+)% chance of an? \w+ above 420 loans /,
        );
        expect(found).not.toBeNull();
        const said = Number(found?.[2]) / 100;
        if (found?.[1] === "under") expect(any).toBeLessThan(said);
        else if (found?.[1] === "over") expect(any).toBeGreaterThan(said);
        else
          expect(Math.abs(said - any)).toBeLessThanOrEqual(
            any < 0.05 || any > 0.95 ? 0.005 + 1e-9 : 0.025 + 1e-9,
          );
      }),
      { numRuns: 1000 },
    );
  });
});

describe("the sentence of what is left of a shock", () => {
  it("adds or takes off by the sign of the shock, tells a swing back as such, with sizes to two digits", () => {
    fc.assert(
      fc.property(steady, (facts) => {
        const text = remainderSentence(speech(facts));
        const [{ shock, effects }] = facts.attribution?.shocks ?? [];
        if (text === null) return;
        const told = text.match(
          new RegExp(
            `(surplus|shortfall) of ${number} loans?.* (still adds|still takes off|is followed by a rebound,|is followed by a dip,) about ${number}`,
          ),
        );
        const half = effects.findIndex((effect) => Math.abs(effect) <= Math.abs(shock) / 2);
        const left = effects[half === -1 ? effects.length - 1 : half];
        expect(/surplus/.test(text)).toBe(shock > 0);
        if (!told) {
          expect(text).toContain("will have faded by");
          expect(Math.abs(left)).toBeLessThan(Math.abs(shock) / 20);
          return;
        }
        const rough = (said: string, truth: number) =>
          expect(Math.abs(readNumber(said) - truth)).toBeLessThanOrEqual(Math.max(0.5, truth * 0.05) + 1e-9);
        rough(told[2], Math.abs(shock));
        const same = shock > 0 ? "still adds" : "still takes off";
        const other = shock > 0 ? "is followed by a dip," : "is followed by a rebound,";
        expect(told[3]).toBe(left * shock > 0 ? same : other);
        rough(told[4], Math.abs(left));
      }),
      { numRuns: 2000 },
    );
  });

  it("of a shortfall that raises a later figure tells a rebound, of a surplus that lowers one a dip", () => {
    const swung = (shock: number): SeriesFacts => ({
      ...quay,
      attribution: {
        longRunLevel: 155,
        shocks: [{ period: "2026-11-30", shock, effects: [-shock / 8, 0] }],
      },
    });
    expect(remainderSentence(speech(swung(-72)))).toBe(
      "last week's shortfall of 72 loans is followed by a rebound, about 9 more in the week of 7 December",
    );
    expect(remainderSentence(speech(swung(72)))).toBe(
      "last week's surplus of 72 loans is followed by a dip, about 9 less in the week of 7 December",
    );
  });

  it("names last week as such only in the week after it", () => {
    expect(remainderSentence(speechFor(quay, britishVoice, "2026-12-07T06:00:00Z"))).toMatch(
      /^last week's surplus of 38 loans still adds about 19 in the week of 11 January$/,
    );
    expect(remainderSentence(speechFor(quay, britishVoice, "2026-12-14T00:00:00Z"))).toMatch(
      /^the surplus of 38 loans in the week of 30 November still adds/,
    );
  });

  it("turns the shares of a model of logarithms into amounts", () => {
    // A shock of ln 1.25 put the last value one fifth of itself above what was expected: 40 of 200.
    const branch = branchFacts({ series: "Quay", level: 155, coefficient: 0.5, shockSize: 22, seed: 3 });
    const facts: SeriesFacts = {
      ...branch,
      history: { ...branch.history, values: [...branch.history.values.slice(0, -1), 200] },
      model: { ...branch.model, scale: "log", shockSize: 0.1 },
      forecast: { ...branch.forecast, point: branch.forecast.point.map(() => 180) },
      attribution: {
        longRunLevel: 155,
        shocks: [{ period: "2026-11-30", shock: Math.log(1.25), effects: [Math.log(1.2), Math.log(1.1)] }],
      },
    };
    // ln 1.1 is the first effect below half of ln 1.25: 180 · (1 − 1/1.1) = 16.4.
    expect(remainderSentence(speech(facts))).toBe(
      "last week's surplus of 40 loans still adds about 16 in the week of 14 December",
    );
  });

  it("after a change follows the fading since the change, not that of the model over the whole past", () => {
    // 0.89^6 = 0.497 is the first share at or below one half: the sixth coming week, that of 11 January.
    const facts = {
      ...branchFacts({ series: "Quay", level: 155, coefficient: 0.5, shockSize: 22, seed: 3, lastShock: 38 }),
      findings: [quayChange],
    };
    expect(remainderSentence(speech(facts))).toBe(
      "last week's surplus of 38 loans still adds about 19 in the week of 7 December",
    );
    expect(remainderSentence(speech(facts), quayChange)).toBe(
      "last week's surplus of 38 loans still adds about 19 in the week of 11 January",
    );
  });

  it("is silent about a shock smaller than half the usual size", () => {
    const facts = branchFacts({
      series: "Quay",
      level: 155,
      coefficient: 0.5,
      shockSize: 22,
      seed: 3,
      lastShock: 4,
    });
    const only = {
      ...facts,
      attribution: { longRunLevel: 155, shocks: [{ period: "2026-11-30", shock: 4, effects: [2, 1] }] },
    };
    expect(remainderSentence(speech(only))).toBeNull();
  });
});
