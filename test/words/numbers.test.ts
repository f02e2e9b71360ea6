import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { numberWriter, roundingStep, roundTo, significantStep } from "../../lib/words/numbers.ts";
import { span } from "../../lib/words/spans.ts";
import { sparkline } from "../../lib/words/sparkline.ts";
import { statisticsWriter } from "../../lib/words/statistics.ts";
import { unitAfter } from "../../lib/words/units.ts";

const british = numberWriter("en-GB");

describe("a number in a sentence", () => {
  it("is rounded by at most a twentieth of its range", () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e8, noNaN: true }), (spread) => {
        const step = roundingStep(spread, false);
        expect(step).toBeLessThanOrEqual((spread / 10) * (1 + 1e-9));
        expect(step).toBeGreaterThan(spread / 60);
      }),
    );
  });

  it("of whole-number data stays whole, whatever the range", () => {
    expect(british(roundTo(12.6, roundingStep(0.3, true)), 1)).toBe("13");
  });

  it("keeps two significant digits where two are asked for", () => {
    expect(british(183, significantStep(183, 2, true))).toBe("180");
    expect(british(0.0448, significantStep(0.0448, 2, false))).toBe("0.045");
    expect(british(1000, significantStep(1000, 2, false))).toBe("1,000");
  });

  it("follows the locale's marks", () => {
    expect(numberWriter("de-DE")(1234.5, 0.1)).toBe("1.234,5");
    expect(numberWriter("fr-FR")(1234.5, 0.1)).toBe("1\u202F234,5");
    expect(numberWriter("en-IN")(1234567, 1)).toBe("12,34,567");
  });

  it("is never minus zero, nor NaN", () => {
    expect(british(-0.2, 1)).toBe("0");
    expect(british(Number.NaN, 1)).toBe("unknown");
    expect(british(Number.POSITIVE_INFINITY, 1)).toBe("unknown");
  });

  it("beyond a thousand million is told in words", () => {
    expect(british(2_340_000_000, 1)).toBe("2.34 billion");
  });
});

describe("a length of time", () => {
  it("is told in halves while short and in fives when long", () => {
    expect(span(0.4, "week", british)).toBe("less than a week");
    expect(span(0.4, "hour", british)).toBe("less than an hour");
    expect(span(1.02, "week", british)).toBe("about 1 week");
    expect(span(1.4, "week", british)).toBe("about 1.5 weeks");
    expect(span(5.9, "week", british)).toBe("about 6 weeks");
    expect(span(33, "day", british)).toBe("about 35 days");
  });
});

describe("a unit", () => {
  it("is singular after one, and left alone where that cannot be known", () => {
    expect(unitAfter("loans", 1)).toBe("loan");
    expect(unitAfter("loans", 2)).toBe("loans");
    expect(unitAfter("loans", 0)).toBe("loans");
    expect(unitAfter("boxes", 1)).toBe("box");
    expect(unitAfter("deliveries", 1)).toBe("delivery");
    for (const unit of ["kg", "gas", "°C", "glass", "GWh"]) expect(unitAfter(unit, 1)).toBe(unit);
    expect(unitAfter(null, 1)).toBe("");
  });
});

describe("small bars", () => {
  it("put past and future on one scale, with a gap shown as a gap", () => {
    expect(sparkline([0, 7, null], [3.5])).toBe("▁█·|▅");
  });

  it("stand half high when nothing moves, and survive a history without figures", () => {
    expect(sparkline([5, 5], [5])).toBe("▄▄|▄");
    expect(sparkline([null], [])).toBe("·|");
  });
});

describe("a p-value", () => {
  it("is told to three decimals, or as below the least of them", () => {
    const { pValue } = statisticsWriter("en-GB");
    expect([0.58712, 0.001, 0.00099, 0].map(pValue)).toEqual([
      "p = 0.587",
      "p = 0.001",
      "p < 0.001",
      "p < 0.001",
    ]);
    expect(statisticsWriter("de-DE").pValue(0.00001)).toBe("p < 0,001");
  });
});
