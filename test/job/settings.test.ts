import { readFileSync } from "node:fs";
import * as fc from "fast-check";
import { describe, expect, it } from "vitest";
import { jsonLines, pathKey } from "../../lib/job/jsonLines.ts";
import { defaultSettings, parseSettings } from "../../lib/job/settings.ts";

const problemsOf = (text: string) =>
  parseSettings(text).problems.map(({ line, code, message, remedy }) => ({ line, code, message, remedy }));

describe("parseSettings", () => {
  it("gives working defaults for no settings, an empty file and an empty object", () => {
    for (const text of [undefined, "", " \n", "{}"])
      expect(parseSettings(text)).toEqual({ settings: defaultSettings, problems: [] });
    expect(defaultSettings).toEqual({
      timeZone: "UTC",
      locale: "en-GB",
      horizon: 8,
      levels: [80, 95],
      falseAlarmRate: 0.05,
      quietWhenSteady: false,
      staleAfter: 2,
      webhooks: [],
      tables: {},
    });
  });

  it("accepts the settings of the README and of the demo", () => {
    const readme = readFileSync("README.md", "utf8");
    const example = /```json\n([\s\S]*?)```/.exec(readme)?.[1];
    expect(parseSettings(example).problems).toEqual([]);
    expect(parseSettings(example).settings.tables.till.values).toEqual(["Betrag"]);
    expect(parseSettings(readFileSync("events/demo/settings.json", "utf8")).problems).toEqual([]);
  });

  it("accepts a byte order mark and the address of a schema", () => {
    expect(parseSettings('\uFEFF{"$schema": "https://example.org/settings.schema.json"}').problems).toEqual(
      [],
    );
  });

  it("lists every problem at once, each with its line", () => {
    const text = [
      "{",
      '  "timezone": "Europe/Lisbon",',
      '  "horizon": 0,',
      '  "levels": [80, 950],',
      '  "webhooks": [',
      '    { "name": "a", "audience": "bosses", "address": "https://example.org/hook" }',
      "  ],",
      '  "tables": {',
      '    "loans": { "evry": "week", "combine": "total",',
      '      "limits": { "abov": 3 } }',
      "  }",
      "}",
    ].join("\n");
    expect(problemsOf(text)).toEqual([
      {
        line: 2,
        code: "unknown-setting",
        message: 'settings.json: there is no setting "timezone"',
        remedy: 'did you mean "timeZone"?',
      },
      {
        line: 3,
        code: "bad-setting",
        message: "settings.json: horizon must be 1 or more, and is 0",
        remedy: "correct it",
      },
      {
        line: 4,
        code: "bad-setting",
        message: "settings.json: levels[2] must be less than 100, and is 950",
        remedy: "correct it",
      },
      {
        line: 6,
        code: "bad-setting",
        message:
          'settings.json: webhooks[1].audience must be one of "business", "analyst", "operations", and is "bosses"',
        remedy: "correct it",
      },
      {
        line: 6,
        code: "bad-setting",
        message:
          "settings.json: webhooks[1].address must be env:NAME or secret:NAME, never the value itself, and is what stands there",
        remedy: "correct it",
      },
      {
        line: 9,
        code: "bad-setting",
        message:
          'settings.json: tables.loans.combine must be one of "sum", "mean", "last", "count", "max", and is "total"',
        remedy: "correct it",
      },
      {
        line: 9,
        code: "unknown-setting",
        message: 'settings.json: there is no setting "evry" under tables.loans',
        remedy: 'did you mean "every"?',
      },
      {
        line: 10,
        code: "unknown-setting",
        message: 'settings.json: there is no setting "abov" under tables.loans.limits',
        remedy: 'did you mean "above"?',
      },
    ]);
  });

  it("never repeats an address or a key that was written into the file", () => {
    const secret = "https://hooks.example.org/T000/very-secret";
    const text = JSON.stringify({
      webhooks: [{ name: "a", audience: "business", address: secret, signingKey: "whsec_c2VjcmV0" }],
    });
    const told = JSON.stringify(problemsOf(text));
    expect(told).not.toContain("very-secret");
    expect(told).not.toContain("whsec_c2VjcmV0");
    expect(problemsOf(text)).toHaveLength(2);
  });

  it("names what is missing", () => {
    expect(problemsOf('{"webhooks": [{"name": "a", "address": "env:A"}]}')).toMatchObject([
      { code: "missing-setting", message: "settings.json: webhooks[1].audience is missing" },
    ]);
  });

  it.each([
    ['{"timeZone": "Lisbon"}', "timeZone must be a time zone by its IANA name"],
    ['{"locale": "english language"}', "locale must be a language tag"],
    ['{"country": "Portugal"}', "country must be a country code"],
    ['{"reportBase": "http://example.org"}', "reportBase must be an https:// address"],
    ['{"falseAlarmRate": 1}', "falseAlarmRate must be less than 1"],
    ['{"tables": {"a": {"timeZone": "Mars/Base"}}}', "tables.a.timeZone must be a time zone"],
    ['{"tables": {"a": {"values": 3}}}', "tables.a.values must be a name, or a list of names"],
    ['{"tables": {"a": {"atLeast": 5, "atMost": 1}}}', "tables.a must have atLeast below atMost"],
    ['{"tables": {"north/a": {"unit": ""}}}', 'tables["north/a"].unit must not be empty'],
    ['{"quietWhenSteady": "yes"}', "quietWhenSteady must be true or false"],
    ["[]", "the whole must be a group in { }"],
    [
      '{"webhooks": [{"name":"a","audience":"business","address":"env:A"},{"name":"a","audience":"analyst","address":"env:B"}]}',
      "webhooks must have different names",
    ],
  ])("refuses %s", (text, words) => {
    const { problems } = parseSettings(text);
    expect(problems).toHaveLength(1);
    expect(problems[0].message).toContain(words);
    expect(problems[0].fatal).toBe(true);
  });

  it("says at which line a text stops being JSON", () => {
    const { problems } = parseSettings('{\n  "horizon": 8,\n}');
    expect(problems).toMatchObject([{ line: 3, code: "not-json", fatal: true }]);
    expect(problems[0].remedy).toContain("comma");
  });

  it("takes any text without a crash", () => {
    fc.assert(
      fc.property(fc.oneof(fc.string(), fc.json()), (text) => {
        const { problems } = parseSettings(text);
        expect(problems.every((problem) => problem.message.startsWith("settings.json: "))).toBe(true);
      }),
    );
  });
});

describe("jsonLines", () => {
  it("finds each key and entry of pretty-printed JSON where its own line says", () => {
    fc.assert(
      fc.property(
        fc.dictionary(fc.string(), fc.oneof(fc.integer(), fc.array(fc.string()), fc.boolean())),
        (value) => {
          const text = JSON.stringify(value, null, 1);
          const lines = text.split("\n");
          const found = jsonLines(text);
          for (const key of Object.keys(value))
            expect(
              lines[(found.get(pathKey([key])) ?? 0) - 1].trimStart().startsWith(JSON.stringify(key)),
            ).toBe(true);
        },
      ),
    );
  });
});
