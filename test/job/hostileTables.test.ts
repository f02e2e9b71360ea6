import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { parse } from "csv-parse/sync";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { runJob } from "../../lib/job/run.ts";
import type { RunSummary } from "../../lib/job/summary.ts";
import { FolderStore } from "../../lib/store/folderStore.ts";
import { keyFault } from "../../lib/store/key.ts";
import type { BodyShape } from "../../lib/webhook/message.ts";
import { leaks } from "../support/canary.ts";
import { hostileNames } from "../support/hostileNames.ts";
import { fillStore, storeTexts } from "../support/jobStores.ts";
import { type Receiver, receiver } from "../support/receiver.ts";
import { strayFiles } from "../support/tinyRun.ts";
import { tinyAsOf, tinyTables } from "../support/tinyTables.ts";

const shapes: readonly BodyShape[] = ["text", "content", "card", "json"];
const formula = /^[=+\-@\t\r\n]/;
/** The tags of a page with what stands between their quotes left out. */
const bareTags = (html: string) =>
  (html.match(/<[a-z/!](?:"[^"]*"|'[^']*'|[^'">])*>/gi) ?? []).map((tag) =>
    tag.replace(/"[^"]*"|'[^']*'/g, ""),
  );

/** What no report holds of its own; a name that got through as markup would bring it in. */
const forbiddenTag = /<\s*\/?\s*(script|img|iframe|object|embed|link|foreignObject|base|form|input|at)\b/i;

const quoted = (name: string) => `"${name.replaceAll('"', '""')}"`;
const dates = tinyTables()["series/lanes.csv"]!.trim().split("\n").slice(1);

/** A weekly table of one series of the given name. */
const tableOf = (name: string) =>
  `week,${quoted(name)}\n${dates.map((row, i) => row.replace(/,.*/, `,${100 + ((i * 37) % 23)}`)).join("\n")}\n`;

describe("a run of tables and series with hostile names", () => {
  let store: FolderStore;
  let summary: RunSummary;
  let texts: Record<string, string>;
  let hooks: Receiver[];
  let tables: string[];
  let fileNames: string[];

  const atEnd: (() => unknown)[] = [];
  afterAll(() => Promise.all(atEnd.map((work) => work())));

  beforeAll(async () => {
    const folder = await mkdtemp(join(tmpdir(), "ebbwire-hostile-"));
    atEnd.push(() => rm(folder, { recursive: true }));
    store = new FolderStore(folder);
    tables = hostileNames.map((_, i) => `n${i}`);
    fileNames = hostileNames.filter(
      (name) => keyFault(`series/${name}.csv`) === undefined && name.length < 100,
    );
    await fillStore(store, tinyTables());
    await fillStore(
      store,
      Object.fromEntries(hostileNames.map((name, i) => [`series/n${i}.csv`, tableOf(name)])),
    );
    await fillStore(
      store,
      Object.fromEntries(fileNames.map((name) => [`series/${name}.csv`, tableOf("visits")])),
    );
    hooks = await Promise.all(shapes.map(() => receiver(undefined, undefined, (work) => atEnd.push(work))));
    summary = await runJob({
      store,
      asOf: tinyAsOf,
      allowLocalWebhooks: true,
      webhooks: hooks.flatMap(({ address }, i) =>
        (["business", "analyst", "operations"] as const).map((audience) => ({
          name: `${audience} ${shapes[i]}`,
          audience,
          body: shapes[i]!,
          address,
        })),
      ),
    });
    texts = await storeTexts(store);
  });

  it("forecasts the tables that are sound, and gives each other one a problem with a remedy", () => {
    const failed = new Map(summary.failed.map((one) => [one.table, one.problems]));
    for (const table of ["lanes", "north/desk", "quay"])
      expect(texts).toHaveProperty([`forecasts/${table}/latest.csv`]);
    let forecast = 0;
    for (const [i, table] of tables.entries()) {
      if (texts[`forecasts/${table}/latest.csv`] !== undefined) forecast++;
      else expect(failed.get(table)?.[0], hostileNames[i]!.slice(0, 40)).toMatchObject({ remedy: /\w/ });
    }
    console.info(
      `${hostileNames.length} hostile series names: ${forecast} forecast, ${tables.length - forecast} refused with a remedy; ${fileNames.length} hostile file names`,
    );
    expect(forecast).toBeGreaterThanOrEqual(30);
    expect(fileNames.length).toBeGreaterThanOrEqual(10);
    for (const delivery of summary.deliveries) expect(delivery).toMatchObject({ status: "delivered" });
  });

  it("writes no cell that a spreadsheet takes for a formula, and no number with a mark before it", () => {
    for (const [key, text] of Object.entries(texts).filter(([name]) => /^forecasts\/.*\.csv$/.test(name))) {
      const rows = parse(text) as string[][];
      for (const [row, cells] of rows.entries()) {
        expect(cells, key).toHaveLength(rows[0]!.length);
        for (const [column, cell] of cells.entries()) {
          if (row > 0 && column > 1) expect(cell, key).toMatch(/^-?\d+(\.\d+)?(e[+-]?\d+)?$/);
          else expect(cell, key).not.toMatch(formula);
        }
      }
    }
  });

  it("draws a report in which no name has become markup", () => {
    const pages = Object.entries(texts).filter(([key]) => key.endsWith(".html"));
    expect(pages.length).toBeGreaterThan(0);
    for (const [key, html] of pages) {
      expect(html.match(forbiddenTag)?.[0], key).toBeUndefined();
      expect(bareTags(html).filter((tag) => /\son[a-z]+\s*=|^<!--/i.test(tag))).toEqual([]);
      expect(html).toContain("Content-Security-Policy");
      expect(html).not.toMatch(/(href|src|action)\s*=\s*["']?\s*(javascript|data:text|https?:\/\/evil)/i);
    }
    expect(pages.map(([, html]) => html).join("")).toContain("&lt;script&gt;alert(1)&lt;/script&gt;");
  });

  it("posts bodies within their budgets in which no name is markup, a mention or a link", () => {
    const budgets = { text: 3_500, content: 2_000, card: 18_000, json: 20_000 };
    for (const [i, shape] of shapes.entries()) {
      expect(hooks[i]!.received).toHaveLength(3);
      for (const { body } of hooks[i]!.received) {
        const parsed = JSON.parse(body);
        const size = shape === "content" ? parsed.content.length : Buffer.byteLength(body);
        expect(size).toBeLessThanOrEqual(budgets[shape]);
        if (shape === "json") continue;
        const said = JSON.stringify(parsed);
        expect(said).not.toMatch(/@(everyone|here|channel|SUM)/);
        expect(said).not.toMatch(/(https?:\/\/|www\.)evil/);
        expect(said).not.toMatch(/[\u202a-\u202e\u2066-\u2069]|\\u0000|\\u001b/);
      }
    }
  });

  it("lets no webhook's address into a document or a body", () => {
    expect(leaks(JSON.stringify(texts))).toEqual([]);
    expect(leaks(JSON.stringify(summary))).toEqual([]);
    for (const { received } of hooks) for (const { body } of received) expect(leaks(body)).toEqual([]);
  });

  it("keeps every document inside its place in the store", async () => {
    for (const key of Object.keys(texts)) {
      expect(keyFault(key)).toBeUndefined();
      expect(key).toMatch(/^(series|models|forecasts|runs)\//);
    }
    expect(await strayFiles(store)).toEqual([]);
  });
});
