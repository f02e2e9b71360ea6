import { describe, expect, it } from "vitest";
import { readTable } from "../../lib/series/readTable.ts";
import type { Problem, Series } from "../../lib/series/series.ts";
import type { CorpusCase } from "./corpus/case.ts";
import { dates } from "./corpus/dates.ts";
import { dialects } from "./corpus/dialects.ts";
import { faults } from "./corpus/faults.ts";
import { numbers } from "./corpus/numbers.ts";
import { periods } from "./corpus/periods.ts";
import { shapes } from "./corpus/shapes.ts";

// Small ugly tables as people's exports write them; the expected values are worked out by hand from the table's text.

const tell = ({ period, start, values }: Series) =>
  `${period} ${start}: ${[...values].map((value) => (Number.isNaN(value) ? "_" : String(value))).join(" ")}`;

const tellProblem = ({ code, line, column, fatal }: Problem) =>
  [`${code}${fatal ? "!" : ""}`, line === undefined ? "" : `line ${line}`, column ?? ""]
    .filter((part) => part !== "")
    .join(" ");

function read({ input, settings, asOf, timeZone, locale }: CorpusCase) {
  return readTable(input, settings ?? {}, {
    asOf: asOf ?? "2026-12-01T06:00:00Z",
    timeZone,
    locale,
    table: "t",
  });
}

const groups: Record<string, readonly CorpusCase[]> = { dialects, numbers, dates, periods, shapes, faults };

for (const [group, cases] of Object.entries(groups)) {
  describe(`readTable, ${group}`, () => {
    for (const one of cases) {
      it(one.claim, () => {
        const { series, problems } = read(one);
        expect(Object.fromEntries(series.map((each) => [each.name, tell(each)]))).toEqual(one.series ?? {});
        expect(problems.map(tellProblem)).toEqual(one.problems ?? []);
        if (one.remedy) expect(problems[0].remedy).toContain(one.remedy);
        for (const { values, observed, gaps } of series) {
          expect(observed + gaps).toBe(values.length);
          expect(observed).toBe(values.filter((value) => !Number.isNaN(value)).length);
        }
        for (const problem of problems) {
          expect(problem.table).toBe("t");
          expect(problem.message.length).toBeGreaterThan(10);
          expect(problem.remedy.length).toBeGreaterThan(3);
        }
      });
    }
  });
}

describe("the corpus", () => {
  it("holds at least 60 tables, every claim once", () => {
    const claims = Object.values(groups).flatMap((cases) => cases.map(({ claim }) => claim));
    expect(claims.length).toBeGreaterThanOrEqual(60);
    expect(new Set(claims).size).toBe(claims.length);
  });
});
