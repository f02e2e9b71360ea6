import type { CorpusCase } from "./case.ts";

const sales = [
  "time,amount",
  "2026-03-01 09:12,3",
  "2026-03-01 17:40,5",
  "2026-03-03 10:00,2",
  "2026-03-03 10:00,2",
  "2026-03-03 08:30,7",
].join("\n");

export const shapes: readonly CorpusCase[] = [
  {
    claim: "takes each column of numbers for a series",
    input: "date,a,b\n2026-03-01,1,10\n2026-03-02,2,20\n",
    series: { a: "day 2026-03-01: 1 2", b: "day 2026-03-01: 10 20" },
  },
  {
    claim: "takes only the columns the settings name",
    input: "date,a,b\n2026-03-01,1,10\n2026-03-02,2,20\n",
    settings: { values: ["b"] },
    series: { b: "day 2026-03-01: 10 20" },
  },
  {
    claim: "finds a long table by names that repeat on every date",
    input: "date,shop,v\n2026-03-01,Quay,1\n2026-03-01,Mill,10\n2026-03-02,Quay,2\n2026-03-02,Mill,20\n",
    series: { Quay: "day 2026-03-01: 1 2", Mill: "day 2026-03-01: 10 20" },
  },
  {
    claim: "finds a long table by numbers of shops that fill every date",
    input: `date,shop,v\n${["01", "02", "03"].flatMap((day) => [`2026-03-${day},7,1`, `2026-03-${day},8,10`]).join("\n")}\n`,
    series: { "7": "day 2026-03-01: 1 1 1", "8": "day 2026-03-01: 10 10 10" },
  },
  {
    claim: "names series of a long table with several columns of numbers by both",
    input:
      "date,shop,in,out\n2026-03-01,Quay,1,5\n2026-03-01,Mill,2,6\n2026-03-02,Quay,3,7\n2026-03-02,Mill,4,8\n",
    series: {
      "Quay, in": "day 2026-03-01: 1 3",
      "Quay, out": "day 2026-03-01: 5 7",
      "Mill, in": "day 2026-03-01: 2 4",
      "Mill, out": "day 2026-03-01: 6 8",
    },
  },
  {
    claim: "reads a long table in any row order",
    input:
      "shop,date,v\nQuay,2026-03-03,3\nMill,2026-03-01,10\nQuay,2026-03-01,1\nMill,2026-03-02,20\nQuay,2026-03-02,2\n",
    settings: { seriesName: "shop" },
    series: { Quay: "day 2026-03-01: 1 2 3", Mill: "day 2026-03-01: 10 20" },
  },
  {
    claim: "lets a series start late and end early",
    input: "date,a,b\n2026-03-01,1,\n2026-03-02,2,20\n2026-03-03,,30\n2026-03-04,,40\n",
    series: { a: "day 2026-03-01: 1 2", b: "day 2026-03-02: 20 30 40" },
  },
  {
    claim: "says which row of a long table has no name",
    input: "date,shop,v\n2026-03-01,Quay,1\n2026-03-02,,9\n2026-03-02,Quay,2\n",
    settings: { seriesName: "shop" },
    series: { Quay: "day 2026-03-01: 1 2" },
    problems: ["no-name line 3 shop"],
  },
  {
    claim: "adds up one row a sale",
    input: sales,
    settings: { every: "day", combine: "sum" },
    series: { amount: "day 2026-03-01: 8 _ 11" },
  },
  {
    claim: "averages the rows of a period",
    input: sales,
    settings: { every: "day", combine: "mean" },
    series: { amount: `day 2026-03-01: 4 _ ${11 / 3}` },
  },
  {
    claim: "takes the last row of a period by its clock, not by its place",
    input: sales,
    settings: { every: "day", combine: "last" },
    series: { amount: "day 2026-03-01: 5 _ 2" },
  },
  {
    claim: "counts the rows of a period",
    input: sales,
    settings: { every: "day", combine: "count" },
    series: { amount: "day 2026-03-01: 2 _ 3" },
  },
  {
    claim: "takes the largest row of a period",
    input: sales,
    settings: { every: "day", combine: "max" },
    series: { amount: "day 2026-03-01: 5 _ 7" },
  },
  {
    claim: "counts rows of a table without numbers under the table's name",
    input: "time,what\n2026-03-01 09:12,in\n2026-03-01 17:40,out\n2026-03-02 10:00,in\n",
    settings: { every: "day", combine: "count" },
    series: { t: "day 2026-03-01: 2 1" },
  },
  {
    claim: "puts a sale after midnight in UTC on the day of the zone",
    input: "time,amount\n2026-07-02T03:30:00Z,5\n2026-07-02T04:30:00Z,7\n",
    settings: { every: "day", combine: "sum" },
    timeZone: "America/New_York",
    series: { amount: "day 2026-07-01: 5 7" },
  },
  {
    claim: "adds up the 25 hours of the day clocks go back",
    input: `time,v\n${[...Array(25).keys()].map((hour) => `${new Date(Date.UTC(2026, 9, 24, 22 + hour)).toISOString()},1`).join("\n")}\n`,
    settings: { every: "day", combine: "sum" },
    timeZone: "Europe/Berlin",
    series: { v: "day 2026-10-25: 25" },
  },
  {
    claim: "sums up several rows a day when no rule is given, and says so",
    input: "time,amount\n2026-03-01 09:12,3\n2026-03-01 17:40,5\n2026-03-02 10:01,2\n2026-03-02 16:20,4\n",
    series: { amount: "day 2026-03-01: 8 6" },
    problems: ["combine-assumed"],
    remedy: "combine",
  },
  {
    claim: "takes a row that came twice for one",
    input: "date,v\n2026-03-01,1\n2026-03-02,2\n2026-03-02,2\n2026-03-03,3\n",
    series: { v: "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "leaves a gap where a date has two different values, and says which lines",
    input: `date,v\n${[1, 2, 3, 4, 5, 6, 7].map((day) => `2026-03-0${day},${day}\n`).join("")}2026-03-02,9\n`,
    series: { v: "day 2026-03-01: 1 _ 3 4 5 6 7" },
    problems: ["repeated-date line 3 v"],
    remedy: "combine",
  },
  {
    claim: "takes the last of two rows by the rule of the settings",
    input: "date,v\n2026-03-01,1\n2026-03-02,2\n2026-03-02,9\n2026-03-03,3\n",
    settings: { combine: "last" },
    series: { v: "day 2026-03-01: 1 9 3" },
  },
  {
    claim: "does not take kW for a week because Germans call weeks KW",
    input: "date,kW\n2026-03-01,5\n2026-03-02,6\n",
    series: { kW: "day 2026-03-01: 5 6" },
  },
  {
    claim: "leaves out columns that spell the date out again",
    input: "date,year,month,v\n2026-03-01,2026,3,5\n2026-03-02,2026,3,6\n",
    series: { v: "day 2026-03-01: 5 6" },
  },
  {
    claim: "leaves out columns of text",
    input: "date,v,weather\n2026-03-01,1,rain\n2026-03-02,2,sun\n",
    series: { v: "day 2026-03-01: 1 2" },
  },
];
