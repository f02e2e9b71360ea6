import { describe, expect, it } from "vitest";
import { renderReport } from "../../lib/report/renderReport.ts";
import { businessMessage } from "../../lib/words/businessMessage.ts";
import { explainSeries } from "../../lib/words/explainSeries.ts";
import type { RunFacts, SeriesFacts } from "../../lib/words/facts.ts";
import { takesPart } from "../../lib/words/takesPart.ts";
import { britishVoice, loansRun, quay, station } from "../support/factsFixture.ts";

const runOf = (facts: SeriesFacts): RunFacts => ({
  ...loansRun,
  tables: [{ table: "loans", series: [facts], problems: [] }],
});
const without = (facts: SeriesFacts): SeriesFacts => ({
  ...facts,
  model: { ...facts.model, weight: 0.0004 },
});
const note = (facts: SeriesFacts) => businessMessage(runOf(facts), britishVoice).lines.join("\n");
const report = (facts: SeriesFacts) => renderReport(runOf(facts), britishVoice)[0].html;
const account = (facts: SeriesFacts) => explainSeries("loans", facts, britishVoice).join("\n");

describe("a describing model without a part in the forecast", () => {
  it("is one of no weight to speak of", () => {
    expect(takesPart({ ...quay.model, weight: 0.0049 })).toBe(false);
    expect(takesPart({ ...quay.model, weight: 0.005 })).toBe(true);
  });

  it("tells business readers nothing of what a shock leaves in the coming periods", () => {
    expect(note(station)).toContain("still adds");
    expect(note(without(station))).toContain("a one-off so far");
    expect(note(without(station))).not.toContain("still adds");
  });

  it("leaves what a change says of shocks alone: that rests on the behaviour since, not on this model", () => {
    expect(note(without(quay))).toBe(note(quay));
    expect(note(quay)).toContain(
      "a busy week now stays with you longer; last week's surplus of 38 loans still",
    );
  });

  it("is called in the report what it is, without the pictures of a model that carries the forecast", () => {
    expect(report(station)).toContain("<h3>What carries the forecast</h3>");
    const page = report(without(station));
    expect(page).toContain(
      "The model that describes how shocks fade has no part to speak of in the forecast.",
    );
    expect(page).toContain("<h3>How shocks fade, and how earlier forecasts did</h3>");
    expect(page).not.toMatch(/What carries the forecast|Past shocks in the forecast/);
  });

  it("is said in the analyst's account to describe and no more", () => {
    expect(account(station)).toContain("one of an average, with weight 0.700.");
    expect(account(without(station))).toContain(
      "it describes how shocks fade, but has no part to speak of in the forecast (weight 0.000).",
    );
    expect(account(without(station))).not.toContain("still adds");
  });
});
