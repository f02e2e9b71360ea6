import type { CorpusCase } from "./case.ts";

const rows = (cells: readonly string[], delimiter = ";") =>
  `date${delimiter}v\n${cells.map((cell, at) => `2026-03-0${at + 1}${delimiter}${cell}\n`).join("")}`;
const quoted = (cells: readonly string[]) =>
  rows(
    cells.map((cell) => `"${cell}"`),
    ",",
  );

export const numbers: readonly CorpusCase[] = [
  {
    claim: "reads points between thousands before a decimal comma",
    input: rows(["1.234,5", "12.345.678,25", "7"]),
    series: { v: "day 2026-03-01: 1234.5 12345678.25 7" },
  },
  {
    claim: "reads commas between thousands before a decimal point",
    input: quoted(["1,234.5", "12,345,678.25", "7"]),
    series: { v: "day 2026-03-01: 1234.5 12345678.25 7" },
  },
  {
    claim: "reads groups of lakhs and crores",
    input: quoted(["12,34,567.5", "1,00,000.0", "7"]),
    series: { v: "day 2026-03-01: 1234567.5 100000 7" },
  },
  {
    claim: "reads blanks and thin blanks between thousands",
    input: rows(["1 234,5", "12\u00a0345", "1\u202f000\u202f000"]),
    series: { v: "day 2026-03-01: 1234.5 12345 1000000" },
  },
  {
    claim: "reads apostrophes between thousands",
    input: rows(["1'234.50", "12’345.00", "7.25"]),
    series: { v: "day 2026-03-01: 1234.5 12345 7.25" },
  },
  {
    claim: "reads currency signs before and after",
    input: rows(["€ 12,50", "12,50 €", "EUR 7,00", "-€3,00", "1,00 kr"]),
    series: { v: "day 2026-03-01: 12.5 12.5 7 -3 1" },
  },
  {
    claim: "reads percent signs as they are written",
    input: rows(["12,5 %", "7%", "-3%"]),
    series: { v: "day 2026-03-01: 12.5 7 -3" },
  },
  {
    claim: "reads parentheses and a minus behind as negative",
    input: rows(["(12,50)", "12,50-", "(€ 3,00)", "−4,5"]),
    series: { v: "day 2026-03-01: -12.5 -12.5 -3 -4.5" },
  },
  {
    claim: "reads scientific notation and leading signs",
    input: rows(["1.5e3", "+2.5", "-1E-2", ".5"]),
    series: { v: "day 2026-03-01: 1500 2.5 -0.01 0.5" },
  },
  {
    claim: "takes NA, dashes, null, errors of spreadsheets and empty cells for gaps",
    input: rows(["1", "NA", "-", "", "n/a", "#N/A", "null", "–", "9"]),
    series: { v: "day 2026-03-01: 1 _ _ _ _ _ _ _ 9" },
  },
  {
    claim: "keeps zero a value",
    input: rows(["0", "0.0", "-0.5"]),
    series: { v: "day 2026-03-01: 0 0 -0.5" },
  },
  {
    claim: "keeps all digits of a number",
    input: rows(["0.1", "12345678901.25", "0.30000000000000004"]),
    series: { v: "day 2026-03-01: 0.1 12345678901.25 0.30000000000000004" },
  },
  {
    claim: "takes small whole numbers beside 1.234 as a sign of thousands",
    input: rows(["980", "1.020", "995"]),
    series: { v: "day 2026-03-01: 980 1020 995" },
  },
  {
    claim: "takes a point for the decimal point where commas separate the cells",
    input: rows(["23.125", "22.987", "23.004"], ","),
    series: { v: "day 2026-03-01: 23.125 22.987 23.004" },
  },
  {
    claim: "takes 0.123 for decimals",
    input: rows(["1.234", "0.987", "2.500"]),
    series: { v: "day 2026-03-01: 1.234 0.987 2.5" },
  },
  {
    claim: "asks for the decimal mark where every number may be either",
    input: rows(["1.234", "2.345", "3.456"]),
    problems: ["decimal-unclear! line 2 v"],
    remedy: "decimal",
  },
  {
    claim: "follows the decimal mark of the settings",
    input: rows(["1.234", "2.345", "3.456"]),
    settings: { decimal: "," },
    series: { v: "day 2026-03-01: 1234 2345 3456" },
  },
  {
    claim: "refuses a table with both decimal marks",
    input: rows(["1.5", "2,5", "3"]),
    problems: ["mixed-decimals! line 3 v"],
  },
  {
    claim: "counts a cell that is no number as a gap and says where",
    input: rows(["1", "closed", "3", "12 boxes", "5"]),
    series: { v: "day 2026-03-01: 1 _ 3 _ 5" },
    problems: ["bad-number line 3 v"],
  },
  {
    claim: "never reads 1.23 as 123 where the comma is the decimal mark",
    input: rows(["1,5", "1.23", "2,5"]),
    settings: { decimal: "," },
    series: { v: "day 2026-03-01: 1.5 _ 2.5" },
    problems: ["bad-number line 3 v"],
  },
  {
    claim: "refuses rows that a bare thousands comma has split",
    input: "date,v\n2026-03-01,980\n2026-03-02,1,020\n2026-03-03,995\n",
    series: { v: "day 2026-03-01: 980 _ 995" },
    problems: ["too-many-cells line 3"],
    remedy: "quotation marks",
  },
  {
    claim: "says so when every row has a cell too many",
    input: "date,v\n2026-03-01,1,5\n2026-03-02,2,5\n2026-03-03,3,5\n",
    problems: ["too-many-cells! line 2"],
  },
  {
    claim: "calls a number beyond all doubles no number",
    input: rows(["1", "1e400", "3"]),
    series: { v: "day 2026-03-01: 1 _ 3" },
    problems: ["bad-number line 3 v"],
  },
];
