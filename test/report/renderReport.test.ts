import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { escapeHtml, html } from "../../lib/report/markup.ts";
import { renderReport } from "../../lib/report/renderReport.ts";
import type { RunFacts } from "../../lib/words/facts.ts";
import { branchFacts, britishVoice, loansRun } from "../support/factsFixture.ts";
import { stationSurprise } from "../support/findingsFixture.ts";
import { hardRun } from "../support/hardFacts.ts";

/** Series of which the last ones have a surprise to tell. */
const manySeries = (count: number, news = 0): RunFacts => ({
  ...loansRun,
  tables: [
    {
      table: "loans",
      problems: [],
      series: Array.from({ length: count }, (_, index) => ({
        ...branchFacts({
          series: `Branch ${index + 1}`,
          level: 100,
          coefficient: 0.6,
          shockSize: 12,
          seed: index,
        }),
        ...(index >= count - news ? { findings: [stationSurprise] } : {}),
      })),
    },
  ],
});

describe("markup", () => {
  it("lets no text out of its place, in content or in a quoted attribute", () => {
    fc.assert(
      fc.property(fc.string({ unit: "binary" }), (text) => {
        const { markup } = html`<p title="${text}">${text}</p>`;
        expect(markup.slice(10, -4)).not.toMatch(/[<'](?!\/?p)/);
        expect(markup.match(/"/g)).toHaveLength(2);
        expect(markup.match(/</g)).toHaveLength(2);
      }),
    );
  });

  it("escapes the five characters that OWASP names for HTML", () => {
    // OWASP Cross Site Scripting Prevention Cheat Sheet, "Output Encoding for HTML Contexts".
    expect(escapeHtml(`&<>"'`)).toBe("&amp;&lt;&gt;&quot;&#39;");
  });

  it("escapes once, and leaves markup made by itself alone", () => {
    expect(html`<ul>${[html`<li>${"a & b"}</li>`]}</ul>`.markup).toBe("<ul><li>a &amp; b</li></ul>");
  });
});

describe("the report", () => {
  it("carries a policy that allows styles and nothing else", () => {
    for (const page of renderReport(loansRun, britishVoice)) {
      expect(page.html).toContain(
        `<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'; img-src data:">`,
      );
      expect(page.html).not.toMatch(/<script|<foreignObject|<iframe|<link|@import|url\(|https?:\/\//i);
    }
  });

  it("shows hostile names as text", () => {
    const [{ html: page }] = renderReport(hardRun, britishVoice);
    expect(page).toContain("&lt;img src=x onerror=alert(1)&gt;");
    expect(page).not.toContain("<img");
    expect(page).not.toContain("\u202E");
  });

  it("has no NaN, no undefined and no infinite number in words or pictures", () => {
    for (const run of [loansRun, hardRun]) {
      for (const { html: page } of renderReport(run, britishVoice))
        expect(page).not.toMatch(/NaN|undefined|Infinity/);
    }
  });

  it("gives every picture a name, a description and the numbers behind it", () => {
    const [{ html: page }] = renderReport(loansRun, britishVoice);
    const pictures =
      page.match(/<svg [^>]*role="img"[^>]*><title [^>]*>[^<]+<\/title><desc [^>]*>[^<]+<\/desc>/g) ?? [];
    expect(pictures.length).toBe(page.match(/<figure/g)?.length);
    expect(page.match(/<summary>Numbers:/g)?.length).toBe(pictures.length);
    expect(pictures.length).toBe(4 * 9);
  });

  it("never gives two elements one id, and every link inside it leads somewhere", () => {
    const pages = renderReport({ ...manySeries(150, 150), failed: hardRun.failed }, britishVoice);
    expect(pages.length).toBeGreaterThan(1);
    expect(pages.map((page) => page.key).slice(0, 2)).toEqual(["report.html", "report-2.html"]);
    const ids = new Map(
      pages.map((page) => [page.key, [...page.html.matchAll(/ id="([^"]+)"/g)].map((match) => match[1])]),
    );
    for (const all of ids.values()) expect(new Set(all).size).toBe(all.length);
    for (const page of pages) {
      for (const [, key, id] of page.html.matchAll(/href="([^"#]*)#?([^"]*)"/g)) {
        const target = ids.get(key === "" ? page.key : key);
        expect(target, key).toBeDefined();
        if (id !== "") expect(target).toContain(id);
      }
    }
  });

  it("of 500 series keeps each page under 15 MB, and lists them all on the front", () => {
    const pages = renderReport(manySeries(500), britishVoice);
    for (const page of pages) expect(new TextEncoder().encode(page.html).length).toBeLessThan(15e6);
    expect(pages[0].html.match(/<span class="name">/g)).toHaveLength(500);
  });

  it("of 500 series draws a hundred, or all with news where those are more", () => {
    for (const [news, sections] of [
      [3, 100],
      [130, 130],
    ]) {
      const pages = renderReport(manySeries(500, news), britishVoice);
      expect(pages.flatMap((page) => page.html.match(/<section id="s/g) ?? [])).toHaveLength(sections);
      for (const branch of ["Branch 499", "Branch 500"])
        expect(pages.map((page) => page.html).join("")).toMatch(new RegExp(`<h2 id="s\\d+h">${branch} `));
      expect(pages[0].html.match(/<li><div class="row">/g)).toHaveLength(500 - sections);
      expect(pages[0].html).toContain("Lines that lead on have pictures;");
    }
  });

  it("is the same to the byte when made again", () => {
    expect(renderReport(hardRun, britishVoice)).toEqual(renderReport(structuredClone(hardRun), britishVoice));
  });

  it("puts what needs attention first and lists the problems of the data with line and remedy", () => {
    const [{ html: page }] = renderReport(hardRun, britishVoice);
    const front = page.slice(page.indexOf('<nav class="front"'), page.indexOf("</nav>"));
    expect([...front.matchAll(/class="chip (\w+)"/g)].map((match) => match[1])).toEqual([
      "changed",
      "changed",
      "changed",
      "late",
      "steady",
      "steady",
      "steady",
    ]);
    expect(page).toContain(
      "line 2, column &lt;b&gt;date&lt;/b&gt;: &quot;30/02/2026&quot; is no date. Correct the day &amp; month.",
    );
    expect(page).toContain("… and 40 more.");
    expect(page).toContain("Not reached before time ran out: one, two, three and 2 more.");
  });

  it("of a run that read nothing still opens and says so", () => {
    const [{ html: page }] = renderReport({ ...loansRun, tables: [], failed: hardRun.failed }, britishVoice);
    expect(page).toContain("No table was read in this run.");
    expect(page).toContain("The file has no header line. Add one.");
  });
});
