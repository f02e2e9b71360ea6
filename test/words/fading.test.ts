import { describe, expect, it } from "vitest";
import { renderReport } from "../../lib/report/renderReport.ts";
import { explainSeries } from "../../lib/words/explainSeries.ts";
import type { ModelFacts, SeriesFacts } from "../../lib/words/facts.ts";
import { britishVoice, loansRun, mill } from "../support/factsFixture.ts";

/** A series without memory: its whole shock is over after one period. */
const memoryless = {
  order: 0,
  coefficients: [],
  standardErrors: [],
  persistence: 0,
  halfLife: 0.5,
  halfLifeRange: { low: 0.5, high: 0.5 },
} as const;
const withModel = (model: Partial<ModelFacts>): SeriesFacts => ({
  ...mill,
  model: { ...mill.model, ...model },
});
const account = (facts: SeriesFacts) => explainSeries("loans", facts, britishVoice).join("\n");
const report = (facts: SeriesFacts) =>
  renderReport({ ...loansRun, tables: [{ table: "loans", series: [facts], problems: [] }] }, britishVoice)[0]
    .html;
const tile = (facts: SeriesFacts) =>
  report(facts)
    .match(/A shock loses half in<\/dt>(.*?)<\/div>/)?.[1]
    .replaceAll(/<[^>]+>/g, "|");

describe("what is said of fading", () => {
  it("holds no half-life where the data cannot tell whether shocks fade", () => {
    const facts = withModel({ ...memoryless, fading: "cannot-tell" });
    expect(account(facts)).toContain("the data cannot tell fading from permanent shocks.");
    expect(account(facts)).not.toMatch(/half-life/i);
    expect(tile(facts)).toBe("||not known||the data cannot tell whether it fades||");
    expect(report(facts)).toContain("The data cannot tell when half is left.");
  });

  it("of swings without an end in the data says that no shift lasts, and gives no half-life", () => {
    const facts = withModel({
      persistence: -1.338,
      halfLife: 216,
      halfLifeRange: { low: null, high: null },
      fading: "fades",
    });
    expect(account(facts)).toContain(
      "Persistence (sum of coefficients): -1.338; the data say that no shift lasts, but not how soon the swings after a shock die out.",
    );
    expect(account(facts)).not.toMatch(/216|half-life|no bound/i);
    expect(tile(facts)).toBe("||not known||it swings back; the data do not say how soon that ends||");
  });

  it("takes a range without any bound for no range, at zero as at none", () => {
    const facts = withModel({ halfLifeRange: { low: 0, high: null }, fading: "permanent" });
    expect(account(facts)).toContain("the data do not contradict permanent shocks.");
    expect(account(facts)).not.toMatch(/half-life|no bound/i);
  });

  it("of a series without memory tells no range of a made-up length", () => {
    const facts = withModel(memoryless);
    expect(account(facts)).toContain(
      "Half-life of a shock: less than 1 week; nothing is left of it by then.",
    );
  });

  it("where the data say that shocks fade tells how soon, with the range", () => {
    expect(account(mill)).toMatch(
      /the data say that shocks fade\.\n {2}Half-life of a shock: 1\.16 weeks \(90% interval /,
    );
    expect(tile(mill)).toBe("||1 week||the data say that it fades||");
  });
});
