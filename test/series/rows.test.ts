import { parse } from "csv-parse/sync";
import * as fc from "fast-check";
import { describe, expect, it } from "vitest";
import { createRowSplitter } from "../../lib/series/rows.ts";

function split(pieces: readonly string[], delimiter = ",") {
  const rows: string[][] = [];
  const lines: number[] = [];
  const comments: string[] = [];
  const splitter = createRowSplitter(delimiter, {
    row(cells, line) {
      rows.push(cells);
      lines.push(line);
    },
    comment: (text) => void comments.push(text),
  });
  for (const piece of pieces) splitter.push(piece);
  return { rows, lines, comments, ...splitter.end() };
}

// The examples of RFC 4180, section 2, rules 1 to 7.
const rfc4180: readonly [rule: string, text: string, rows: string[][]][] = [
  [
    "1: each record on its own line",
    "aaa,bbb,ccc\r\nzzz,yyy,xxx\r\n",
    [
      ["aaa", "bbb", "ccc"],
      ["zzz", "yyy", "xxx"],
    ],
  ],
  [
    "2: the last record without a line end",
    "aaa,bbb,ccc\r\nzzz,yyy,xxx",
    [
      ["aaa", "bbb", "ccc"],
      ["zzz", "yyy", "xxx"],
    ],
  ],
  [
    "3: a header line",
    "field_name,field_name,field_name\r\naaa,bbb,ccc\r\nzzz,yyy,xxx\r\n",
    [
      ["field_name", "field_name", "field_name"],
      ["aaa", "bbb", "ccc"],
      ["zzz", "yyy", "xxx"],
    ],
  ],
  ["4: fields separated by commas", "aaa,bbb,ccc", [["aaa", "bbb", "ccc"]]],
  [
    "5: fields in quotes or not",
    '"aaa","bbb","ccc"\r\nzzz,yyy,xxx',
    [
      ["aaa", "bbb", "ccc"],
      ["zzz", "yyy", "xxx"],
    ],
  ],
  [
    "6: line breaks and commas in quotes",
    '"aaa","b\r\nbb","ccc"\r\nzzz,yyy,xxx',
    [
      ["aaa", "b\r\nbb", "ccc"],
      ["zzz", "yyy", "xxx"],
    ],
  ],
  ["7: doubled quotes", '"aaa","b""bb","ccc"', [["aaa", 'b"bb', "ccc"]]],
];

describe("createRowSplitter", () => {
  it.each(rfc4180)("follows RFC 4180, rule %s", (_rule, text, rows) => {
    expect(split([text]).rows).toEqual(rows);
  });

  it("counts lines as an editor does, line ends in quotes included", () => {
    expect(split(['a,b\n"1\n2",x\n\n3,4\n']).lines).toEqual([1, 2, 4, 5]);
  });

  it("hands out comment lines apart, without minding their quotes", () => {
    const { rows, comments } = split(['# a "quote\na,b\n#,c\n1,2\n']);
    expect(rows).toEqual([
      ["a", "b"],
      ["1", "2"],
    ]);
    expect(comments).toEqual(['# a "quote', "#,c"]);
  });

  it("tells where a quote opens that never closes", () => {
    expect(split(['a,b\n1,"2\n3,4\n'])).toMatchObject({ rows: [["a", "b"]], unclosedQuote: 2 });
  });

  const cell = fc.string({ unit: fc.constantFrom(..."ab,;|\t\"\r\n é'"), maxLength: 6 });
  const table = fc.array(fc.array(cell, { minLength: 2, maxLength: 4 }), { minLength: 1, maxLength: 6 });
  /** Cells that neither a comment sign nor a lone return makes ambiguous, written by the rules of RFC 4180. */
  const written = (rows: readonly (readonly string[])[], delimiter: string) =>
    rows.map((row) => row.map((text) => `"${text.replaceAll('"', '""')}"`).join(delimiter)).join("\r\n");

  it("agrees with csv-parse on any quoted table, cut into pieces anywhere", () => {
    fc.assert(
      fc.property(
        table,
        fc.constantFrom(",", ";", "\t", "|"),
        fc.integer({ min: 1, max: 9 }),
        (rows, delimiter, size) => {
          const text = written(rows, delimiter);
          const pieces = text.match(new RegExp(`[^]{1,${size}}`, "g")) ?? [];
          const expected = parse(text, { delimiter, relax_column_count: true }) as string[][];
          expect(split(pieces, delimiter).rows).toEqual(expected);
          expect(expected).toEqual(rows);
        },
      ),
      { numRuns: 500 },
    );
  });

  it("agrees with csv-parse on bare cells", () => {
    const bare = fc.string({ unit: fc.constantFrom(..."ab;|. 1é'-"), maxLength: 6 });
    fc.assert(
      fc.property(
        fc.array(fc.array(bare, { minLength: 2, maxLength: 4 }), { minLength: 1, maxLength: 6 }),
        (rows) => {
          const text = rows.map((row) => row.join(",")).join("\n");
          const expected = parse(text, { relax_column_count: true }) as string[][];
          expect(split([text]).rows).toEqual(expected);
        },
      ),
      { numRuns: 500 },
    );
  });
});
