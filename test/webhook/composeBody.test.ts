import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { composeBody } from "../../lib/webhook/composeBody.ts";
import type { BodyShape, Message } from "../../lib/webhook/message.ts";
import { hostileNames } from "../support/hostileNames.ts";

const shapes: readonly BodyShape[] = ["text", "content", "card", "json"];
const chats = ["text", "content", "card"] as const;

function message(more: Partial<Message>): Message {
  return { title: "Loans, week of 30 November", lines: [], footer: "", data: { schema: 1 }, ...more };
}

/** All text of a body that people read. */
function shown(shape: (typeof chats)[number], more: Partial<Message>): string {
  const parsed = JSON.parse(composeBody(message(more), shape).body);
  if (shape === "text") return parsed.text;
  if (shape === "content") return parsed.content;
  const { body } = parsed.attachments[0].content;
  return body.map((block: { inlines: { text: string }[] }) => block.inlines[0]!.text).join("\n");
}

/** Size as each budget counts it. */
function size(shape: BodyShape, body: string): number {
  return shape === "content" ? JSON.parse(body).content.length : Buffer.byteLength(body);
}

const budgets = { text: 3_500, content: 2_000, card: 18_000, json: 20_000 };
const steering =
  // biome-ignore lint/suspicious/noControlCharactersInRegex: control characters are what is looked for
  /[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u061c\u200e\u200f\u2028-\u202e\u2060-\u206f\ufeff\u{e0000}-\u{e007f}]/u;

describe("composeBody", () => {
  it("sets the four shapes as their receivers document them", () => {
    const note = message({
      lines: ["Quay: about 210 loans"],
      footer: "Report: https://example.com/r",
      data: { schema: 1, tables: 2 },
    });
    const parsed = (shape: BodyShape) => JSON.parse(composeBody(note, shape).body);
    expect(parsed("text")).toEqual({
      text: "Loans, week of 30 November\nQuay: about 210 loans\nReport: https://example.com/r",
    });
    expect(parsed("content")).toEqual({
      content: "Loans, week of 30 November\nQuay: about 210 loans\nReport: https://example.com/r",
      allowed_mentions: { parse: [] },
    });
    expect(parsed("card")).toMatchObject({
      type: "message",
      attachments: [
        {
          contentType: "application/vnd.microsoft.card.adaptive",
          contentUrl: null,
          content: { type: "AdaptiveCard", version: "1.2", body: expect.any(Array) },
        },
      ],
    });
    expect(parsed("json")).toEqual({ schema: 1, tables: 2 });
    for (const shape of shapes)
      expect(composeBody(note, shape).contentType).toBe("application/json; charset=utf-8");
    expect(() => composeBody(note, "xml" as BodyShape)).toThrow(
      "composeBody needs text, content, card or json, not xml",
    );
  });

  it("leaves plain text as it is in every chat shape", () => {
    const lines = [
      "Mill: 1,234 (1,100–1,400) ▁▂▃▅▇ +4.5 %",
      "",
      "desk_calls.csv: as usual – nothing changed.",
      "• 3 × 20 = 60; e.g. O'Brien & sons",
    ];
    for (const shape of ["content", "card"] as const) {
      const text = shown(shape, { lines }).replaceAll("\\", "");
      for (const line of lines) expect(text).toContain(line);
    }
    expect(shown("text", { lines })).toContain(lines.join("\n").replace("&", "&amp;"));
  });

  it("keeps within every budget by leaving out whole lines from the end, and says how many", () => {
    const lines = Array.from(
      { length: 2_000 },
      (_, i) => `Series ${i} <&> "quoted" \\ 日本 🧀: about ${i} loans`,
    );
    for (const shape of chats) {
      const { body } = composeBody(message({ lines, footer: "the end" }), shape);
      expect(size(shape, body)).toBeLessThanOrEqual(budgets[shape]);
      const text = shown(shape, { lines, footer: "the end" }).split("\n");
      expect(text.at(-1)).toBe("the end");
      const more = Number(/^… and (\d+) more$/.exec(text.at(-2)!)![1]);
      const kept = text.slice(1, -2).filter((line) => line.startsWith("Series "));
      expect(kept.length + more).toBe(2_000);
      for (const [i, line] of kept.entries()) expect(line.endsWith(`about ${i} loans`)).toBe(true);
      // One line more would not have fitted.
      const oneMore = Buffer.byteLength(JSON.stringify(kept.at(-1))) + 150;
      expect(size(shape, body) + oneMore).toBeGreaterThan(budgets[shape]);
    }
  });

  it("counts lines of text alone when it says how many are missing", () => {
    const lines = Array.from({ length: 200 }, (_, i) =>
      i % 2 === 0 ? `Series ${i}: ${"x".repeat(90)}` : "",
    );
    for (const shape of ["text", "content"] as const) {
      const text = shown(shape, { lines }).split("\n");
      const kept = text.filter((line) => line.startsWith("Series ")).length;
      expect(text.at(-1)).toBe(`… and ${100 - kept} more`);
    }
  });

  it("leaves nothing out when everything fits", () => {
    for (const shape of chats) expect(shown(shape, { lines: ["a", "b", "c"] })).not.toContain("more");
  });

  it("json keeps within its budget by shortening the longest lists, and says what is missing", () => {
    const series = Array.from({ length: 5_000 }, (_, i) => ({ series: `Series ${i}`, next: i }));
    const data = { schema: 1, asOf: "2026-11-30T06:00:00Z", series, notices: [{ kind: "level" }] };
    const { body } = composeBody(message({ data }), "json");
    expect(Buffer.byteLength(body)).toBeLessThan(budgets.json);
    const parsed = JSON.parse(body);
    expect(parsed).toMatchObject({ schema: 1, asOf: data.asOf, notices: data.notices });
    expect(parsed.series.length + parsed.omitted.series).toBe(5_000);
    expect(parsed.series).toEqual(series.slice(0, parsed.series.length));
  });

  it("json shortens the inner list that takes the space, not the list it stands in", () => {
    const data = { tables: [{ table: "a", values: Array(19_000).fill(1) }, { table: "b" }], notices: [1, 2] };
    const parsed = JSON.parse(composeBody(message({ data }), "json").body);
    expect(parsed.tables.map(({ table }: { table: string }) => table)).toEqual(["a", "b"]);
    expect(parsed.tables[0].values.length + parsed.omitted["tables.0.values"]).toBe(19_000);
    expect(parsed.notices).toEqual([1, 2]);
  });

  it("json keeps within its budget whatever the data are like", () => {
    const many = Object.fromEntries(Array.from({ length: 3_000 }, (_, i) => [`name ${i}`, i]));
    const nested = {
      tables: Array.from({ length: 40 }, (_, t) => ({ t, values: Array.from({ length: 400 }, (_, i) => i) })),
    };
    for (const data of [
      "x".repeat(30_000),
      [["🧀".repeat(20_000)]],
      many,
      nested,
      Array(30_000).fill(0),
      null,
      undefined,
    ]) {
      const { body } = composeBody(message({ data }), "json");
      expect(Buffer.byteLength(body)).toBeLessThan(budgets.json);
      JSON.parse(body);
    }
  });

  it("json gives names exactly as they are, and holds no character that is read as markup", () => {
    for (const name of hostileNames.filter((one) => one.length < 300)) {
      const { body } = composeBody(message({ data: { table: name } }), "json");
      expect(JSON.parse(body)).toEqual({ table: name });
      expect(body).not.toMatch(/[<>&\u202a-\u202e\u2066-\u2069]/);
      expect(body).not.toMatch(steering);
    }
  });

  it("covers at least thirty hostile names", () => {
    expect(new Set(hostileNames).size).toBeGreaterThanOrEqual(30);
  });

  it.each(hostileNames)("hostile name %# stays one line of harmless text within the budget", (name) => {
    for (const shape of chats) {
      const more = { title: name, lines: [name, `before ${name} after`], footer: "" };
      const { body } = composeBody(message(more), shape);
      expect(size(shape, body)).toBeLessThanOrEqual(budgets[shape]);
      const text = shown(shape, more);
      expect(text.split("\n").length).toBeLessThanOrEqual(3);
      expect(text).not.toMatch(steering);
      expect(text).not.toMatch(/[\ud800-\udfff]/u);
      expect(text).not.toMatch(/@[\p{L}\p{N}&!]/u);
      expect(text).not.toMatch(/:\/\/|www\.|javascript:|mailto:/i);
      expect(text).not.toMatch(/evil\.example/);
      if (shape === "text") {
        expect(text).not.toMatch(/[<>`]|&(?!amp;|lt;|gt;)/);
        expect(text).not.toMatch(/(^|\n)\s*(#|&gt;)/);
        expect(text).not.toMatch(/[*~]\S/);
        expect(text).not.toMatch(/\]\(/);
      }
      if (shape === "content") {
        // Every mark of Markdown stands behind an odd number of backslashes, and `<` opens nothing.
        expect(text.replace(/\\[\\*_~`|>[\]()#-]/g, "")).not.toMatch(/[\\*_~`|>[\]()]|(^|\n)\s*#/);
        expect(text).not.toMatch(/<[@#:t!/a-z]/);
      }
    }
  });

  it("any text in any place keeps every budget and gives valid JSON", () => {
    const text = fc.string({ unit: "binary", maxLength: 700 });
    const arbitrary = fc.record({
      title: text,
      lines: fc.array(text, { maxLength: 60 }),
      footer: text,
      data: fc.jsonValue(),
    });
    fc.assert(
      fc.property(arbitrary, fc.constantFrom(...shapes), (note, shape) => {
        const { body } = composeBody(note, shape);
        JSON.parse(body);
        expect(size(shape, body)).toBeLessThanOrEqual(budgets[shape]);
      }),
      { numRuns: 400, seed: 1 },
    );
  });
});
