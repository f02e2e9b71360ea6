import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { businessMessage } from "../../lib/words/businessMessage.ts";
import type { Finding, RunFacts, SeriesFacts } from "../../lib/words/facts.ts";
import { hasNews } from "../../lib/words/hasNews.ts";
import { changeOf, periodKind, seriesOf, surpriseOf } from "../support/factsArbitrary.ts";
import { branchFacts, britishVoice, loansRun, quay } from "../support/factsFixture.ts";
import { quayChange, stationSurprise } from "../support/findingsFixture.ts";

const steadyBranch = (series: string, seed: number) =>
  branchFacts({ series, level: 100, coefficient: 0.5, shockSize: 12, seed });
const oneTable = (series: readonly SeriesFacts[]): RunFacts => ({
  ...loansRun,
  tables: [{ table: "loans", series, problems: [] }],
});
const quietVoice = { ...britishVoice, quietWhenSteady: true };

describe("the business note", () => {
  it("of one table says in twelve lines what to expect, what changed and what it means", () => {
    // Read and agreed to, line by line: a change here is a change of what people are told.
    const { title, lines, footer } = businessMessage(loansRun, britishVoice);
    expect([title, ...lines, footer]).toEqual([
      "loans: 1 new lasting change, 1 one-off surprise",
      "Quay: about 185 loans in the week of 7 December (155 to 210), about 1,400 over all 8 weeks (1,000 to 1,800). ▃▆▆▄▁▃▃▁▅▆▅█|███▇▇▇▇▇",
      "Quay: shocks now lose half their effect in about 6 weeks; it was 2 (an early sign).",
      "Quay: a busy week now stays with you longer; last week's surplus of 38 loans still adds about 19 in the week of 11 January.",
      "Quay: since about the week of 21 September (between the week of 31 August and the week of 12 October).",
      "Quay: about 30% chance of a week above 260 loans by the week of 25 January.",
      "Station: about 114 loans in the week of 7 December (100 to 128), about 780 over all 8 weeks (710 to 840). ▄▄▃▁▄▄▂▁▃▃▂█|▆▄▄▃▃▃▃▃",
      "Station: 148 loans in the week of 30 November, about 56 more than expected: a one-off so far, not a lasting change.",
      "Station: if nothing else happens it still adds about 25 in the week of 7 December and has all but faded by the week of 28 December.",
      "Mill: about 85 loans in the week of 7 December (71 to 99), about 700 over all 8 weeks (620 to 780). ▄▁▅▅▃██▆▃▇▇▅|▅▆▆▆▆▆▆▆",
      "Park: about 113 loans in the week of 7 December (95 to 131), about 950 over all 8 weeks (870 to 1,030). ▃██▅▂▇▇▄▁▆▆▃|▅▅▆▆▆▆▆▆",
      "In brackets the range that holds 80% of outcomes; bars: last 12 weeks | those to come.",
      "So far 311 of 384 figures (81%) fell inside the range, where 80% should; misses are 25% smaller than by repeating the past.",
      "Statistical estimates: they can be wrong. Decisions where safety or much money hangs on them need a qualified person's judgement. Why, with pictures: runs/2026-12-07T06-00-00Z/report.html",
    ]);
  });

  it("keeps to about twelve lines of at most 160 characters, each naming its series, without unexplained symbols", () => {
    const series = periodKind.chain((period) =>
      seriesOf(
        period,
        fc
          .tuple(fc.option(changeOf(period)), fc.option(surpriseOf(period)))
          .map((all) => all.filter((one): one is NonNullable<typeof one> => one !== null)),
      ),
    );
    fc.assert(
      fc.property(fc.array(series, { minLength: 1, maxLength: 30 }), (all) => {
        const named = all.map((one, index) => ({ ...one, series: `Branch ${index + 1}` }));
        const { title, lines } = businessMessage(oneTable(named), britishVoice);
        expect(lines.length).toBeLessThanOrEqual(13);
        for (const line of [title, ...lines]) {
          expect([...line].length).toBeLessThanOrEqual(160);
          // Letters, digits, plain punctuation, percent, and the bars that the note itself explains.
          expect(line).toMatch(/^[\p{L}\d .,:;'"()%/…|▁▂▃▄▅▆▇█·-]+$/u);
          expect(line).not.toMatch(/NaN|undefined|null|Infinity|\[object/);
        }
        for (const line of lines) expect(line).toMatch(/^(Branch \d+: |… and |In brackets |So far )/);
        const counted = lines.join("\n").match(/… and (\d+) /);
        const told = new Set(lines.flatMap((line) => line.match(/^Branch \d+/)?.[0] ?? []));
        expect(told.size + Number(counted?.[1] ?? 0)).toBe(all.length);
      }),
      { numRuns: 300 },
    );
  });

  it("keeps its width with the longest names, and names the series on every line", () => {
    const longest = "a very long name of a branch that nobody can shorten ".repeat(3);
    const tables = [1, 2].map((table) => ({
      table: `${longest}${table}`,
      series: [{ ...quay, series: `${longest}Quay`, unit: longest }],
      problems: [],
    }));
    const { lines } = businessMessage({ ...loansRun, tables }, britishVoice);
    for (const line of lines) {
      expect([...line].length).toBeLessThanOrEqual(160);
      expect(line).toMatch(/^(a very long name .*Quay: |… and |In brackets |So far )/);
    }
    expect(lines.length).toBeLessThanOrEqual(13);
  });

  it("writes numbers and dates as the locale does, in any script", () => {
    const first = (locale: string) => businessMessage(oneTable([quay]), { ...britishVoice, locale }).lines[0];
    expect(first("en-US")).toContain("in the week of December 7 (155 to 210), about 1,400 over all 8 weeks");
    expect(first("de-DE")).toContain("in the week of 7. Dezember (155 to 210), about 1.400 over all 8 weeks");
    expect(first("fr-FR")).toContain("about 1\u202F400 over all 8 weeks");
    expect(first("ar-EG")).toContain("١٨٥");
  });

  it("for many tables tells the most changed first and counts the steady", () => {
    const tables = Array.from({ length: 12 }, (_, table) => ({
      table: `town-${table + 1}`,
      series: [steadyBranch("Quay", table), steadyBranch("Mill", table + 20)],
      problems: [],
    }));
    tables[7] = { ...tables[7], series: [tables[7].series[0], { ...quay, series: "Harbour" }] };
    const { title, lines } = businessMessage({ ...loansRun, tables }, britishVoice);
    expect(title).toBe("12 tables: 1 new lasting change");
    expect(lines[0]).toMatch(/^town-8, Harbour: about 185 loans/);
    expect(lines[1]).toMatch(/^town-8, Harbour: shocks now lose half/);
    expect(lines.some((line) => /^… and \d+ more, steady\.$/.test(line))).toBe(true);
  });

  it("names a series that has its table's name once", () => {
    const tables = [
      { table: "loans", series: [steadyBranch("Quay", 1)], problems: [] },
      { table: "members", series: [steadyBranch("members", 2)], problems: [] },
    ];
    const { lines } = businessMessage({ ...loansRun, tables }, britishVoice);
    expect(lines.slice(0, 2).map((line) => line.slice(0, line.indexOf(":")))).toEqual([
      "loans, Quay",
      "members",
    ]);
  });

  it("gives news its room before steady series get theirs", () => {
    const steady = Array.from({ length: 30 }, (_, index) => steadyBranch(`Steady ${index}`, index));
    const news = Array.from({ length: 4 }, (_, index) => ({ ...quay, series: `Changed ${index}` }));
    const { lines } = businessMessage(oneTable([...steady, ...news]), britishVoice);
    for (const { series } of news)
      expect(lines.filter((line) => line.startsWith(`${series}: shocks now`))).toHaveLength(1);
  });

  it("tells no total of a series whose periods do not add up, such as members at the end of each month", () => {
    const { lines } = businessMessage(oneTable([{ ...quay, adds: false }]), britishVoice);
    expect(lines[0]).toMatch(/^Quay: about 185 loans in the week of 7 December \(155 to 210\)\. [▁-█|]+$/);
  });

  it("calls a change new only in the run that saw it first", () => {
    const earlier = { ...quay, findings: [{ ...quayChange, noticed: "2026-11-09" }] };
    expect(businessMessage(oneTable([earlier]), britishVoice).title).toBe("loans: 1 recent lasting change");
  });

  it("with the quiet setting tells only what changed, and counts the rest", () => {
    const { lines } = businessMessage(loansRun, quietVoice);
    expect(lines.some((line) => line.startsWith("Mill"))).toBe(false);
    expect(lines).toContain("… and 2 more, steady.");
    const calm = businessMessage(oneTable([steadyBranch("Mill", 1)]), quietVoice);
    expect(calm.title).toBe("loans: nothing has changed");
    expect(calm.lines[0]).toBe("1 steady.");
  });

  it("ends with what went wrong: the table, the line in the file and the remedy", () => {
    const problem = {
      table: "calls",
      line: 14,
      column: "date",
      code: "bad-date",
      message: "31/02/2026 is no date.",
      remedy: "Correct the day.",
      fatal: true,
    };
    const { title, lines } = businessMessage(
      { ...loansRun, failed: [{ table: "calls", problems: [problem] }], left: ["members"] },
      britishVoice,
    );
    expect(title).toBe("2 tables: 1 new lasting change, 1 one-off surprise, 1 table not read");
    expect(lines).toContain(
      "calls was not refitted; an earlier forecast stands as it was. line 14, column date: 31/02/2026 is no date. Correct the day.",
    );
    expect(lines).toContain("Not reached in time: members; the retry goes on with them.");
  });

  it("breaks no sentence of what went wrong over two lines", () => {
    const problem = {
      table: "sales",
      line: 512,
      column: "Altstadt",
      code: "odd-value",
      message: '"1.250" is a thousand times what stands around it, and may be 1,250 with its point misread',
      remedy: "correct it, or leave the cell empty when the value is not known",
      fatal: false,
    };
    const tables = [{ ...loansRun.tables[0], problems: [problem] }];
    const { lines } = businessMessage({ ...loansRun, tables }, britishVoice);
    expect(lines.slice(-2)).toEqual([
      'loans: line 512, column Altstadt: "1.250" is a thousand times what stands around it, and may be 1,250 with its point misread.',
      "Correct it, or leave the cell empty when the value is not known.",
    ]);
  });

  it("marks where a sentence longer than a line goes on", () => {
    const message = `${"a very long account of one cell ".repeat(6)}ends`;
    const problem = { table: "loans", code: "x", message, remedy: "mend it", fatal: false };
    const tables = [{ ...loansRun.tables[0], problems: [problem] }];
    const { lines } = businessMessage({ ...loansRun, tables }, britishVoice);
    expect(lines.at(-1)).toMatch(/^… .*ends\. Mend it\.$/);
  });

  it("says first that an earlier note never arrived", () => {
    const undelivered = [{ asOf: "2026-11-30T06:00:00Z", webhook: "counter" }];
    const { lines } = businessMessage({ ...loansRun, undelivered }, britishVoice);
    expect(lines[0]).toBe(
      "The note of 30 November 2026 could not be delivered then, and comes with this one.",
    );
  });

  it("puts the report under the owner's base address when there is one", () => {
    const { footer } = businessMessage(loansRun, {
      ...britishVoice,
      reportBase: "https://reports.example/tools/",
    });
    expect(footer).toMatch(/ https:\/\/reports\.example\/tools\/runs\/2026-12-07T06-00-00Z\/report\.html$/);
  });

  it("carries data that stay within a receiver's budget however many series there are", () => {
    const many = oneTable(Array.from({ length: 500 }, (_, index) => steadyBranch(`Branch ${index}`, index)));
    const data = businessMessage(many, britishVoice).data as { series: unknown[]; omitted: number };
    expect(new TextEncoder().encode(JSON.stringify(data)).length).toBeLessThan(14_000);
    expect(data.series.length + data.omitted).toBe(500);
  });

  it("always carries the caution about decisions that need a qualified person", () => {
    expect(businessMessage(loansRun, britishVoice).footer).toMatch(/qualified person's judgement/);
  });
});

describe("news", () => {
  const newsOf = (findings: readonly Finding[]) =>
    hasNews(oneTable([{ ...steadyBranch("Mill", 1), findings }]));
  it("is a fresh change, a surprise or late data, but not a change told before", () => {
    expect(newsOf([])).toBe(false);
    expect(newsOf([quayChange])).toBe(true);
    expect(newsOf([{ ...quayChange, fresh: false }])).toBe(false);
    expect(newsOf([stationSurprise])).toBe(true);
    expect(newsOf([{ code: "stale", lastPeriod: "2026-11-09", periodsLate: 3 }])).toBe(true);
    expect(newsOf([{ code: "no-new-values", since: "2026-11-30" }])).toBe(false);
    expect(newsOf([{ code: "gaps", count: 2, latest: "2026-08-10" }])).toBe(false);
  });

  it("is a change when it is seen first and when it is confirmed, not in the weeks between and after", () => {
    const at = (noticed: string, status: "provisional" | "confirmed", looksUsed: number) => {
      const finding = { ...quayChange, noticed, status, evidence: { ...quayChange.evidence, looksUsed } };
      return hasNews(oneTable([{ ...steadyBranch("Mill", 1), findings: [finding] }]));
    };
    // The monitor has used 30 looks; the run before was on 23 November, when the week of 23 November was not over.
    expect(at("2026-11-30", "provisional", 30)).toBe(true);
    expect(at("2026-11-23", "provisional", 29)).toBe(true);
    expect(at("2026-11-16", "provisional", 28)).toBe(false);
    expect(at("2026-10-05", "confirmed", 30)).toBe(true);
    expect(at("2026-10-05", "confirmed", 27)).toBe(false);
  });

  it("of a first run is any change it finds in the past", () => {
    const first = {
      ...steadyBranch("Mill", 1),
      comparison: null,
      findings: [{ ...quayChange, noticed: "2026-10-05" }],
    };
    expect(hasNews(oneTable([first]))).toBe(true);
    expect(businessMessage(oneTable([first]), britishVoice).title).toBe("loans: 1 new lasting change");
  });

  it("of changes found in looking back says so, and calls none of them new", () => {
    const changed = { ...quayChange, noticed: "2026-10-05", status: "confirmed" as const, lookedBack: true };
    const mill = { ...steadyBranch("Mill", 1), findings: [changed] };
    const first = businessMessage(oneTable([{ ...mill, comparison: null }]), britishVoice);
    expect(first.title).toBe("loans: 1 lasting change found in the past");
    expect(first.lines.join(" ")).toContain("it was 2 (found looking back).");
    const next = businessMessage(oneTable([mill]), britishVoice);
    expect(next.title).toBe("loans: 1 recent lasting change");
    expect(next.lines.join(" ")).toContain("it was 2 (found looking back; now confirmed).");
    const inTime = {
      ...mill,
      comparison: null,
      findings: [changed, { ...quayChange, noticed: "2026-11-30" }],
    };
    expect(businessMessage(oneTable([inTime]), britishVoice).title).toBe("loans: 1 new lasting change");
  });

  it("is not the same change again when no new figures have come", () => {
    const again: readonly Finding[] = [quayChange, { code: "no-new-values", since: "2026-11-30" }];
    expect(newsOf(again)).toBe(false);
  });

  it("is a limit that is more likely passed than not", () => {
    const limited = (any: number) => {
      const facts = branchFacts({
        series: "Mill",
        level: 100,
        coefficient: 0.5,
        shockSize: 12,
        seed: 1,
        limit: 130,
      });
      const chances = facts.forecast.chances.map((one) => ({ ...one, any }));
      return hasNews(oneTable([{ ...facts, forecast: { ...facts.forecast, chances } }]));
    };
    expect(limited(0.3)).toBe(false);
    expect(limited(0.6)).toBe(true);
  });

  it("is a table that failed, was not reached, or a note still owed", () => {
    const calm = oneTable([steadyBranch("Mill", 1)]);
    expect(hasNews({ ...calm, failed: [{ table: "calls", problems: [] }] })).toBe(true);
    expect(hasNews({ ...calm, left: ["calls"] })).toBe(true);
    expect(hasNews({ ...calm, undelivered: [{ asOf: calm.asOf, webhook: "counter" }] })).toBe(true);
  });
});
