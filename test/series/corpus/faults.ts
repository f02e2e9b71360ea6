import { gzipSync } from "node:zlib";
import type { CorpusCase } from "./case.ts";

const bytes = (...codes: number[]) => new Uint8Array(codes);

export const faults: readonly CorpusCase[] = [
  { claim: "says that a file is empty", input: "", problems: ["empty!"] },
  {
    claim: "says that a file of blank lines is empty",
    input: new Uint8Array(Buffer.from("\n \r\n\n")),
    problems: ["empty!"],
  },
  {
    claim: "says that a table has a header and nothing below it",
    input: "date,v\n",
    problems: ["no-rows! line 1"],
  },
  {
    claim: "asks for a header where data begin in the first line",
    input: "2026-03-01,1\n2026-03-02,2\n2026-03-03,3\n",
    problems: ["no-header! line 1"],
    remedy: "date,value",
  },
  {
    claim: "says that a table has one column only",
    input: "date\n2026-03-01\n2026-03-02\n",
    problems: ["one-column! line 1"],
    remedy: "comma",
  },
  {
    claim: "says what stands where dates should",
    input: "when,v\nmonday,1\ntuesday,2\nwednesday,3\n",
    problems: ["no-dates! line 2 when"],
    remedy: "2026-11-30",
  },
  {
    claim: "says that every date is impossible",
    input: "date,v\n2026-13-01,1\n2026-13-02,2\n2026-13-03,3\n",
    problems: ["no-dates! line 2 date"],
  },
  {
    claim: "says that no column holds numbers",
    input: "date,what\n2026-03-01,rain\n2026-03-02,sun\n",
    problems: ["no-values! line 2 what"],
    remedy: "count",
  },
  {
    claim: "says that all cells of the value column are empty",
    input: "date,v\n2026-03-01,\n2026-03-02,\n",
    settings: { values: "v" },
    problems: ["no-values!"],
  },
  {
    claim: "says where a quotation mark opens that never closes",
    input: 'date,v\n2026-03-01,1\n2026-03-02,"2\n2026-03-03,3\n',
    problems: ["quote-not-closed! line 3"],
  },
  {
    claim: "knows a workbook from a table",
    input: bytes(0x50, 0x4b, 3, 4, 20, 0, 6, 0, 8, 0),
    problems: ["not-a-table!"],
    remedy: "CSV",
  },
  {
    claim: "knows a PDF from a table",
    input: bytes(0x25, 0x50, 0x44, 0x46, 0x2d, 0x31, 0x2e, 0x37, 0x0a),
    problems: ["not-a-table!"],
  },
  {
    claim: "knows a web page from a table",
    input: "<!DOCTYPE html>\n<html><body>Sign in</body></html>",
    problems: ["not-a-table!"],
    remedy: "sign-in",
  },
  {
    claim: "knows JSON from a table",
    input: '[{"date": "2026-03-01", "v": 1}]',
    problems: ["not-a-table!"],
    remedy: "CSV",
  },
  {
    claim: "knows bytes that are no text",
    input: bytes(...Array.from({ length: 300 }, (_, at) => (at * 7919) % 256)),
    problems: ["not-a-table!"],
  },
  {
    claim: "says that a gzip file is cut off",
    input: new Uint8Array(gzipSync("date,v\n2026-03-01,1\n2026-03-02,2\n").subarray(0, 25)),
    problems: ["bad-gzip!"],
  },
  {
    claim: "says that a file was compressed twice",
    input: new Uint8Array(gzipSync(gzipSync("date,v\n2026-03-01,1\n"))),
    problems: ["not-a-table!"],
  },
  {
    claim: "says which line the settings took for the header in vain",
    input: "date,v\n2026-03-01,1\n",
    settings: { headerLine: 9 },
    problems: ["no-header! line 9"],
  },
  {
    claim: "says which series column is not there",
    input: "date,shop,v\n2026-03-01,Quay,1\n2026-03-02,Quay,2\n",
    settings: { seriesName: "shops" },
    problems: ["no-such-column! shops"],
    remedy: '"shop"',
  },
];
