import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { analystMessage } from "../../lib/words/analystMessage.ts";
import { businessMessage } from "../../lib/words/businessMessage.ts";
import { explainSeries } from "../../lib/words/explainSeries.ts";
import type { RunFacts } from "../../lib/words/facts.ts";
import { operationsMessage } from "../../lib/words/operationsMessage.ts";
import { plainName, plainText } from "../../lib/words/plainText.ts";
import { britishVoice, loansRun } from "../support/factsFixture.ts";

// Characters that change how the text around them is shown: controls, bidirectional marks, zero-width characters.
const unseen = /[\p{Cc}\p{Cf}\p{Zl}\p{Zp}]/u;

describe("a name from outside", () => {
  it("loses every control, bidirectional and invisible character", () => {
    fc.assert(
      fc.property(fc.string({ unit: "binary" }), (name) => {
        for (const plain of [plainText(name, 40), plainName(name, 40)]) {
          expect(plain).not.toMatch(unseen);
          expect([...plain].length).toBeGreaterThan(0);
          expect([...plain].length).toBeLessThanOrEqual(40);
        }
      }),
      { numRuns: 5000 },
    );
  });

  it("keeps its letters of any script, accents included", () => {
    expect(plainText("Entrepôt  Łódź 東京", 40)).toBe("Entrepôt Łódź 東京");
  });

  it("without a visible character is called (no name)", () => {
    expect(plainText("\u200B\u202E\n", 40)).toBe("(no name)");
  });

  it("too long is cut in its middle, where names differ least", () => {
    expect(plainName("export-of-loans-by-branch-2026-Quay", 20)).toBe("export-of-loa…6-Quay");
  });

  it("keeps at most two marks on a letter, so that it cannot cover its neighbours", () => {
    expect(plainText(`e${"\u0301".repeat(50)}`, 40)).toBe("e\u0301\u0301");
  });

  it("cannot put a line of its own or a hidden character into any message or the terminal", () => {
    const hostile = fc.oneof(
      fc.string({ unit: "binary", minLength: 1 }),
      fc.constantFrom(
        "Quay\n@everyone you won",
        "\u202Eyauq",
        "\u001B[2J\u001B]8;;http://x\u0007",
        "=cmd|'/C calc'!A1",
        "<script>",
      ),
    );
    fc.assert(
      fc.property(hostile, hostile, hostile, (table, series, unit) => {
        const facts = { ...loansRun.tables[0].series[0], series, unit };
        const problem = {
          table,
          line: 3,
          column: series,
          code: "x",
          message: unit,
          remedy: table,
          fatal: true,
        };
        const run: RunFacts = {
          ...loansRun,
          tables: [{ table, series: [facts], problems: [problem] }],
          failed: [{ table: `${table}x`, problems: [problem] }],
          left: [table],
          undelivered: [{ asOf: loansRun.asOf, webhook: series }],
        };
        const notes = [businessMessage, analystMessage, operationsMessage].map((write) =>
          write(run, britishVoice),
        );
        const lines = notes.flatMap((note) => [note.title, ...note.lines, note.footer]);
        for (const line of [...lines, ...explainSeries(table, facts, britishVoice)])
          expect(line).not.toMatch(unseen);
      }),
      { numRuns: 300 },
    );
  });
});
