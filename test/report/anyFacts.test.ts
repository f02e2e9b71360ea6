import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { renderReport } from "../../lib/report/renderReport.ts";
import { changeOf, periodKind, seriesOf, surpriseOf } from "../support/factsArbitrary.ts";
import { britishVoice, loansRun } from "../support/factsFixture.ts";

const series = periodKind.chain((period) =>
  seriesOf(
    period,
    fc
      .tuple(fc.option(changeOf(period)), fc.option(surpriseOf(period)))
      .map((all) => all.filter((one): one is NonNullable<typeof one> => one !== null)),
  ),
);

/** Tags that are opened and not closed in order; HTML's void elements and self-closed SVG shapes aside. */
function unclosed(page: string): string[] {
  const open: string[] = [];
  for (const [, end, name, rest] of page.matchAll(/<(\/?)([a-z][a-z0-9]*)\b([^>]*)>/g)) {
    if (name === "meta" || rest.endsWith("/")) continue;
    if (end === "") open.push(name);
    else if (open.pop() !== name) return [`</${name}> closes nothing`];
  }
  return open;
}

describe("the report of any facts", () => {
  it("is whole, closes every tag it opens, and draws no shape at an impossible place", () => {
    fc.assert(
      fc.property(fc.array(series, { minLength: 1, maxLength: 3 }), (all) => {
        const [{ html: page }] = renderReport(
          { ...loansRun, tables: [{ table: "loans", series: all, problems: [] }] },
          britishVoice,
        );
        expect(page).not.toMatch(/NaN|undefined|Infinity|\[object/);
        expect(unclosed(page)).toEqual([]);
        for (const [, path] of page.matchAll(/ d="([^"]*)"/g)) {
          // Every picture is drawn within a square of side 1000, the tide line at the top in a smaller one.
          const numbers = [...path.matchAll(/-?\d+(?:\.\d+)?/g)].map((match) => Number(match[0]));
          expect(Math.max(...numbers.map(Math.abs), 0)).toBeLessThanOrEqual(1001);
        }
      }),
      { numRuns: 150 },
    );
  });

  it("is judged by a check that does see an open tag", () => {
    expect(unclosed("<p><b>x</p>")).not.toEqual([]);
    expect(unclosed("<p>x")).toEqual(["p"]);
  });
});
