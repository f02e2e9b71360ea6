import type { CorpusCase } from "./case.ts";

const of = (cells: readonly string[]) => `date,v\n${cells.map((cell, at) => `${cell},${at + 1}\n`).join("")}`;

export const periods: readonly CorpusCase[] = [
  {
    claim: "finds weeks and the day they begin on from the dates",
    input: of(["2026-03-04", "2026-03-11", "2026-03-18"]),
    series: { v: "week 2026-03-04: 1 2 3" },
  },
  {
    claim: "finds months from dates on the first",
    input: of(["2026-01-01", "2026-02-01", "2026-03-01"]),
    series: { v: "month 2026-01-01: 1 2 3" },
  },
  {
    claim: "finds months from dates on the last day",
    input: of(["2026-01-31", "2026-02-28", "2026-03-31"]),
    series: { v: "month 2026-01-01: 1 2 3" },
  },
  {
    claim: "finds months from the last working days",
    input: of(["2026-01-30", "2026-02-27", "2026-03-31", "2026-04-30"]),
    series: { v: "month 2026-01-01: 1 2 3 4" },
  },
  {
    claim: "finds quarters and years from dates",
    input: of(["2024-03-31", "2024-06-30", "2024-09-30"]),
    series: { v: "quarter 2024-01-01: 1 2 3" },
  },
  {
    claim: "finds years from dates",
    input: of(["2022-12-31", "2023-12-31", "2024-12-31"]),
    series: { v: "year 2022-01-01: 1 2 3" },
  },
  {
    claim: "keeps a week that moved by a day for a holiday in its place",
    input: of(["2026-03-02", "2026-03-09", "2026-03-17", "2026-03-23"]),
    series: { v: "week 2026-03-02: 1 2 3 4" },
  },
  {
    claim: "takes dates of weeks ending for their last days",
    input: "week ending,v\n2026-03-08,1\n2026-03-15,2\n2026-03-22,3\n",
    series: { v: "week 2026-03-02: 1 2 3" },
  },
  {
    claim: "keeps working days as days with gaps between",
    input: of(["2026-03-05", "2026-03-06", "2026-03-09", "2026-03-10"]),
    series: { v: "day 2026-03-05: 1 2 _ _ 3 4" },
  },
  {
    claim: "leaves the gap of a long closure open",
    input: of(["2026-03-02", "2026-03-09", "2026-03-16", "2026-04-20", "2026-04-27"]),
    series: { v: "week 2026-03-02: 1 2 3 _ _ _ _ 4 5" },
  },
  {
    claim: "leaves out the period that is not over",
    input: of(["2026-03-02", "2026-03-09", "2026-03-16"]),
    asOf: "2026-03-20T06:00:00Z",
    series: { v: "week 2026-03-02: 1 2" },
  },
  {
    claim: "ends the day by the zone's clock, not by UTC",
    input: of(["2026-03-01", "2026-03-02", "2026-03-03"]),
    asOf: "2026-03-04T03:00:00Z",
    timeZone: "America/New_York",
    series: { v: "day 2026-03-01: 1 2" },
  },
  {
    claim: "leaves out rows of the future",
    input: of(["2026-11-29", "2026-11-30", "2026-12-01", "2026-12-02"]),
    series: { v: "day 2026-11-29: 1 2" },
  },
  {
    claim: "says when no period is over yet",
    input: of(["2026-12-01", "2026-12-02", "2026-12-03"]),
    problems: ["no-complete-period!"],
  },
  {
    claim: "gathers days into weeks that begin as set",
    input: of(["2026-03-01", "2026-03-02", "2026-03-07", "2026-03-08", "2026-03-15"]),
    settings: { every: "week", weekStartsOn: "sunday", combine: "sum" },
    series: { v: "week 2026-03-01: 6 4 5" },
  },
  {
    claim: "says that it summed days up when the settings name a longer step only",
    input: of(["2026-03-01", "2026-03-02", "2026-04-01", "2026-04-02"]),
    settings: { every: "month" },
    series: { v: "month 2026-03-01: 3 7" },
    problems: ["combine-assumed"],
    remedy: "combine",
  },
  {
    claim: "takes empty periods for zero when told so",
    input: of(["2026-03-01", "2026-03-04"]),
    settings: { every: "day", emptyMeans: "zero" },
    series: { v: "day 2026-03-01: 1 0 0 2" },
  },
  {
    claim: "reads labels of a calendar of one's own",
    input: "fiscal,v\nFY2025-P11,1\nFY2025-P12,2\nFY2026-P01,3\nFY2026-P02,4\n",
    settings: { period: "fiscal" },
    series: { v: "month 2025-11-01: 1 2 3 4" },
  },
  {
    claim: "refuses a thirteenth period",
    input: "fiscal,v\n2025-P12,1\n2025-P13,2\n2026-P01,3\n",
    settings: { period: "fiscal" },
    series: { v: "month 2025-12-01: 1 3" },
    problems: ["bad-date line 3 fiscal"],
  },
  {
    claim: "asks for the step when there is one date only",
    input: of(["2026-03-01"]),
    problems: ["no-period! date"],
    remedy: "every",
  },
  {
    claim: "asks for the step when dates are spaced like no period",
    input: of(["2026-03-01", "2026-03-11", "2026-03-21", "2026-03-31"]),
    problems: ["no-period! date"],
  },
  {
    claim: "asks for the step when rows are six hours apart",
    input: of(["2026-03-01 00:00", "2026-03-01 06:00", "2026-03-01 12:00", "2026-03-01 18:00"]),
    problems: ["no-period! date"],
    remedy: "every",
  },
  {
    claim: "refuses an hour grid across decades with a date here and there",
    input: "time,v\n1990-01-01 00:00,1\n1990-01-01 01:00,2\n2025-01-01 00:00,3\n",
    settings: { every: "hour" },
    problems: ["dates-far-apart! time"],
  },
];
