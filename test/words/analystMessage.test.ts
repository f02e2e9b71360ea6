import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { analystMessage } from "../../lib/words/analystMessage.ts";
import type { ChangeFinding } from "../../lib/words/changeWords.ts";
import { explainSeries } from "../../lib/words/explainSeries.ts";
import type { RunFacts, SeriesFacts } from "../../lib/words/facts.ts";
import { operationsMessage } from "../../lib/words/operationsMessage.ts";
import { changeOf, seriesOf } from "../support/factsArbitrary.ts";
import { britishVoice, loansRun, quay } from "../support/factsFixture.ts";
import { quayChange } from "../support/findingsFixture.ts";

const runOf = (facts: SeriesFacts): RunFacts => ({
  ...loansRun,
  tables: [{ table: "loans", series: [facts], problems: [] }],
});

describe("the analyst's notice", () => {
  const { lines } = analystMessage(runOf(quay), britishVoice);
  const text = lines.join("\n");

  it("gives the evidence a change was called by: statistic, boundary, looks and false-alarm rate", () => {
    expect(text).toContain("statistic 2.31 against a boundary of 1.52, at look 30 of 52");
    expect(text).toContain("a steady series gives any notice over all 52 looks with probability 5%");
  });

  it("names the statistic that a change was noticed by, with its value and look at the notice", () => {
    const evidence = {
      ...quayChange.evidence,
      statistic: 1.4,
      looksUsed: 28,
      passed: { kind: "level" as const, statistic: 2.31, look: 20 },
    };
    const changed = { ...quayChange, status: "confirmed" as const, evidence };
    const said = (change: ChangeFinding) =>
      analystMessage(runOf({ ...quay, findings: [change] }), britishVoice).lines.join("\n");
    expect(said(changed)).toContain(
      "Evidence: the level statistic passed its boundary of 1.52 with 2.31, at look 20 of 52; a steady series gives any notice over all 52 looks with probability 5%. The kind is judged apart from that, by what explains the values best.",
    );
    expect(said({ ...changed, kind: "level" })).not.toContain("judged apart");
  });

  it("of a change confirmed by an earlier version says that its numbers are those of the confirmation", () => {
    const facts = { ...quay, findings: [{ ...quayChange, status: "confirmed" as const }] };
    expect(analystMessage(runOf(facts), britishVoice).lines.join("\n")).toContain(
      "Evidence: when confirmed, at look 30 of 52, the statistic it was noticed by stood at 2.31 against a boundary of 1.52;",
    );
  });

  it("claims of a change found in looking back no notice at that time", () => {
    const facts = { ...quay, findings: [{ ...quayChange, noticed: "2026-10-12", lookedBack: true }] };
    expect(analystMessage(runOf(facts), britishVoice).lines.join("\n")).toContain(
      "Change of persistence, provisional, found looking back on the past, its statistic having passed in the week of 12 October.",
    );
  });

  it("dates the change with its interval and sets both behaviours side by side", () => {
    expect(text).toContain("Date: week of 21 September; interval week of 31 August to week of 12 October.");
    const row = (name: string) =>
      lines
        .find((line) => line.trim().startsWith(name))
        ?.trim()
        .split(/\s{2,}/);
    expect(row("persistence  ")).toEqual(["persistence", "0.710", "0.890"]);
    expect(row("half-life, weeks")).toEqual(["half-life, weeks", "2.02", "5.90"]);
    expect(row("shock size")).toEqual(["shock size", "21.0", "22.0"]);
  });

  it("compares coefficient by coefficient: old, new, difference and its standard error", () => {
    const row = lines
      .find((line) => line.trim().startsWith("lag 1"))
      ?.trim()
      .split(/\s{2,}/);
    expect(row).toEqual(["lag 1", "0.870", "0.890", "+0.020", "0.040"]);
    expect(text).toContain("order 1 then, 1 now");
  });

  it("tells half-life with its interval, level, shock size, rhythm and the whiteness of the residuals", () => {
    expect(text).toContain("Half-life of a shock: 5.95 weeks (90% interval 2.94 to no bound).");
    expect(text).toContain("Long-run level: 155 loans (standard error 19.6)");
    expect(text).toContain("Shock size (standard deviation of the innovations): 22.0 loans.");
    expect(text).toContain("Rhythm: none (no complex pair of roots).");
    expect(text).toContain("Ljung-Box 11.3 on 13 degrees of freedom, p = 0.587");
  });

  it("says what it does not say, and how many notices chance alone would bring", () => {
    expect(text).toContain("Not said: why it changed, that it will last, or that nothing else changed");
    expect(text).toContain("The numbers after rest on 11 values");
    expect(analystMessage(loansRun, britishVoice).lines.join("\n")).toContain(
      "If all 4 watched series stayed steady, chance alone would bring about 0.2 notices in a year of looks.",
    );
  });

  it("names both kinds when two fit nearly as well, and only then", () => {
    const change = (period: "week") =>
      seriesOf(
        period,
        changeOf(period).map((one) => [one]),
      );
    const names = {
      persistence: "persistence",
      level: "level",
      trend: "trend",
      "shock-size": "shock size",
      season: "season",
    };
    fc.assert(
      fc.property(change("week"), (facts) => {
        const { kind, alternative, evidence, status } = facts.findings[0] as ChangeFinding;
        const said = analystMessage(runOf(facts), britishVoice).lines.join("\n");
        if (alternative)
          expect(said).toContain(`Kind: ${names[kind]} or ${names[alternative]}; both fit nearly as well`);
        else expect(said).toContain(`Kind: ${names[kind]} (`);
        expect(said.includes("no other kind fits nearly as well")).toBe(alternative === null);
        expect(said).toContain(`at look ${evidence.looksUsed} of 52`);
        expect(said.includes("The kind is provisional")).toBe(status === "provisional");
        expect(said).not.toMatch(/NaN|undefined|null|Infinity/);
      }),
      { numRuns: 500 },
    );
  });

  it("of a model of logarithms gives no unit to its shock size", () => {
    const facts = { ...quay, model: { ...quay.model, scale: "log" as const, shockSize: 0.12 } };
    const said = analystMessage(runOf(facts), britishVoice).lines.join("\n");
    expect(said).toContain("Shock size (standard deviation of the innovations): 0.120 (of the logarithm).");
  });

  it("of permanent shocks says infinite, never a number", () => {
    const model = {
      ...quay.model,
      halfLife: null,
      halfLifeRange: { low: 8, high: null },
      fading: "permanent" as const,
      longRunStandardDeviation: null,
    };
    const said = analystMessage(runOf({ ...quay, model }), britishVoice).lines.join("\n");
    expect(said).toContain(
      "Half-life of a shock: infinite: shocks do not fade (90% interval 8.00 to no bound).",
    );
    expect(said).toContain("the data do not contradict permanent shocks");
  });
});

describe("the account of one series in the terminal", () => {
  it("has a section for what to expect, what changed, the model, the comparison, the watch and the record", () => {
    const lines = explainSeries("loans", quay, britishVoice);
    expect(lines[0]).toBe("loans, Quay, in loans");
    const sections = lines.filter((line, index) => lines[index - 1] === "" && !line.startsWith(" "));
    expect(sections.slice(0, -1)).toEqual([
      "What to expect",
      "What changed",
      "Also worth knowing",
      "The model",
      "Compared with before",
      "The watch for change",
      "Track record",
    ]);
  });

  it("tells changes of earlier runs too", () => {
    const old = { ...quay, findings: [{ ...quayChange, fresh: false, status: "confirmed" as const }] };
    expect(explainSeries("loans", old, britishVoice).join("\n")).toContain(
      "Change of persistence, confirmed",
    );
  });

  it("of a series that nothing is known of yet still says what there is", () => {
    const bare: SeriesFacts = {
      ...quay,
      unit: null,
      findings: [{ code: "forecast-note", note: { code: "too-short", observed: 3 } }],
      comparison: null,
      attribution: null,
      monitor: null,
      trackRecord: null,
      backTest: { origins: 0, relativeError: null, coverage80: null },
      model: {
        ...quay.model,
        order: 0,
        coefficients: [],
        standardErrors: [],
        ljungBox: null,
        residualAutocorrelations: [],
      },
    };
    const text = explainSeries("loans", bare, britishVoice).join("\n");
    expect(text).toContain("Only 3 figures so far, so the forecast is a simple one.");
    expect(text).toContain("No coefficients: the series shows no memory.");
    expect(text).toContain("Residuals: too few for a test of whiteness.");
    expect(text).toContain("Watch: none yet");
  });
});

describe("the note for operations", () => {
  it("says what was done and how long it took", () => {
    const { title, lines } = operationsMessage({ ...loansRun, durationMilliseconds: 4_321 }, britishVoice);
    expect(title).toBe("All done: run of 7 December 2026 at 06:00");
    expect(lines[0]).toBe("Refitted 1 table with 4 series in 4.3 s; 0 tables failed, 0 not reached.");
  });

  it("names what failed, what was not reached, what is late and what could not be delivered", () => {
    const problem = {
      table: "calls",
      code: "no-header",
      message: "The file has no header line",
      remedy: "Add one",
      fatal: true,
    };
    const late: SeriesFacts = {
      ...quay,
      findings: [{ code: "stale", lastPeriod: "2026-11-09", periodsLate: 3 }],
    };
    const { title, lines } = operationsMessage(
      {
        ...runOf(late),
        failed: [{ table: "calls", problems: [problem] }],
        left: ["a", "b"],
        undelivered: [{ asOf: "2026-11-30T06:00:00Z", webhook: "counter" }],
      },
      britishVoice,
    );
    expect(title).toMatch(/^Needs a look: /);
    expect(lines).toContain("Failed: calls. The file has no header line. Add one.");
    expect(lines).toContain(
      "Not reached before time ran out: a, b. Running again with the same time goes on with them.",
    );
    expect(lines).toContain("Late: loans, Quay.");
    expect(lines).toContain("Undelivered: the note of 30 November 2026 at 06:00 to counter.");
  });
});
