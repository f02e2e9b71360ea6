import { describe, expect, it } from "vitest";
import { evidenceSchema } from "../../lib/drift/noticeSchemas.ts";
import { analystMessage } from "../../lib/words/analystMessage.ts";
import type { RunFacts } from "../../lib/words/facts.ts";
import { britishVoice, loansRun } from "../support/factsFixture.ts";

/** The run with every change's evidence carrying the caution. */
function cautious(run: RunFacts): RunFacts {
  return JSON.parse(JSON.stringify(run), (key, value) =>
    key === "evidence" ? { ...value, caution: "clustered-shocks" } : value,
  ) as RunFacts;
}

describe("the analyst's notice", () => {
  it("warns of false notices where large shocks came in clusters, and only there", () => {
    const run = loansRun;
    const says = (one: RunFacts) =>
      analystMessage(one, britishVoice).lines.some((line) => /Caution: .*clusters/.test(line));
    expect(says(run)).toBe(false);
    expect(says(cautious(run))).toBe(true);
  });

  it("keeps the caution, and what was noticed, through the store", () => {
    const stored = {
      statistic: 3,
      boundary: 2,
      looksUsed: 1,
      looks: 52,
      falseAlarmRate: 0.05,
      caution: "clustered-shocks",
    };
    expect(evidenceSchema.parse(JSON.parse(JSON.stringify(stored)))).toEqual(stored);
    const noticed = { ...stored, passed: { kind: "level", statistic: 3.2, look: 1 } };
    expect(evidenceSchema.parse(JSON.parse(JSON.stringify(noticed)))).toEqual(noticed);
    const { caution: _caution, ...older } = stored;
    expect(evidenceSchema.parse(older)).toEqual(older);
  });
});
