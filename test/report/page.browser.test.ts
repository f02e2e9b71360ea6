import axe from "axe-core";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { renderReport } from "../../lib/report/renderReport.ts";
import { browserPath, openBrowser, openPage } from "../support/browser.ts";
import { britishVoice, loansRun } from "../support/factsFixture.ts";
import { hardRun } from "../support/hardFacts.ts";

const looks = [320, 390, 768, 1280].flatMap((width) =>
  (["light", "dark"] as const).map((scheme) => ({ width, scheme })),
);
const runs = { plain: loansRun, hard: hardRun };

/** Pairs of labels whose boxes meet, among the words around each picture and in each row of the front. */
const overlaps = (page: Page) =>
  page.locator(".plot,.front li,.tiles").evaluateAll((groups) =>
    groups.flatMap((group) => {
      const boxes = [
        ...group.querySelectorAll(
          ".ys span,.xs span,.marks b,figcaption,.legend li,.told li,.name,.chip,.next,.news,dt,dd",
        ),
      ]
        .map((element) => ({ text: element.textContent ?? "", box: element.getBoundingClientRect() }))
        .filter(({ box }) => box.width > 0);
      return boxes.flatMap((one, index) =>
        boxes
          .slice(index + 1)
          .filter(
            ({ box }) =>
              Math.min(box.right, one.box.right) - Math.max(box.left, one.box.left) > 0.5 &&
              Math.min(box.bottom, one.box.bottom) - Math.max(box.top, one.box.top) > 1.5,
          )
          .map((other) => `${one.text} × ${other.text}`),
      );
    }),
  );

describe.skipIf(!browserPath)("the report in a browser", () => {
  let browser: Browser;
  beforeAll(async () => {
    browser = await openBrowser();
  });
  afterAll(() => browser?.close());

  for (const [name, run] of Object.entries(runs)) {
    const [{ html }] = renderReport(run, britishVoice);
    for (const look of looks) {
      it(`${name}, ${look.width} wide, ${look.scheme}: nothing scrolls sideways and no labels meet`, async () => {
        const page = await openPage(browser, html, look);
        const wide = await page.locator("html").evaluate((root) => root.scrollWidth);
        expect(wide).toBeLessThanOrEqual(look.width);
        expect(await overlaps(page)).toEqual([]);
        await page.context().close();
      });
    }

    for (const look of looks.filter(({ width }) => width === 390 || width === 1280)) {
      it(`${name}, ${look.width} wide, ${look.scheme}: breaks no rule of WCAG 2.2 A and AA that axe can check`, async () => {
        const page = await openPage(browser, html, look);
        await page.locator("details").evaluateAll((drawers) => {
          for (const drawer of drawers) drawer.setAttribute("open", "");
        });
        // The page's own policy forbids scripts, so the checker is put in from outside it.
        await page.evaluate(axe.source);
        const found = await page.locator("html").evaluate(async (root) => {
          const checker = (globalThis as unknown as { axe: typeof import("axe-core") }).axe;
          const result = await checker.run(root, {
            runOnly: ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa", "best-practice"],
          });
          return {
            passes: result.passes.length,
            violations: result.violations.map(
              (one) => `${one.id}: ${one.nodes.map((node) => node.html.slice(0, 120)).slice(0, 3)}`,
            ),
          };
        });
        expect(found.violations).toEqual([]);
        expect(found.passes).toBeGreaterThan(15);
        await page.context().close();
      });
    }
  }

  it("is judged by a check that does find labels that meet", async () => {
    const page = await openPage(browser, renderReport(loansRun, britishVoice)[0].html, {
      width: 320,
      scheme: "light",
    });
    await page.addStyleTag({ content: ".xs span{left:40% !important}" });
    expect((await overlaps(page)).length).toBeGreaterThan(10);
    await page.context().close();
  });

  it("asks the network for nothing and runs no script", async () => {
    const context = await browser.newContext();
    const page = await context.newPage();
    const asked: string[] = [];
    const spoken: string[] = [];
    page.on("request", (request) => asked.push(request.url()));
    page.on("console", (message) => spoken.push(message.text()));
    await page.setContent(renderReport(hardRun, britishVoice)[0].html);
    await page.waitForTimeout(200);
    expect(asked).toEqual([]);
    expect(spoken).toEqual([]);
    expect(await page.locator("script,iframe,object,embed,link,img").count()).toBe(0);
    await context.close();
  });

  it("shows every number behind a picture to someone with a keyboard alone", async () => {
    const page = await openPage(browser, renderReport(loansRun, britishVoice)[0].html, {
      width: 1280,
      scheme: "light",
    });
    const figures = await page.locator("figure").count();
    const drawers = page.locator("figure > details > summary");
    expect(figures).toBeGreaterThan(30);
    expect(await drawers.evaluateAll((all) => all.filter((one) => one.tabIndex === 0).length)).toBe(figures);
    await page.context().close();
  });
});
