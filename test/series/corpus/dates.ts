import type { CorpusCase } from "./case.ts";

/** Rows of dates with the values 1, 2, 3, … */
const of = (cells: readonly string[], delimiter = ",", header = "date") =>
  `${header}${delimiter}v\n${cells.map((cell, at) => `${cell}${delimiter}${at + 1}\n`).join("")}`;

export const dates: readonly CorpusCase[] = [
  {
    claim: "reads ISO dates with slashes and single digits",
    input: of(["2026/3/1", "2026/3/2", "2026/3/3"]),
    series: { v: "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "reads YYYYMMDD in a column called a date",
    input: of(["20260301", "20260302", "20260303"]),
    series: { v: "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "reads ISO weeks",
    input: of(["2026-W09", "2026-W10", "2026-W11"]),
    series: { v: "week 2026-02-23: 1 2 3" },
  },
  {
    claim: "reads week 53 and the week after it",
    input: of(["2020-W52", "2020-W53", "2021-W01"]),
    series: { v: "week 2020-12-21: 1 2 3" },
  },
  {
    claim: "reads days of ISO weeks",
    input: of(["2026-W09-1", "2026-W09-2", "2026-W09-3"]),
    series: { v: "day 2026-02-23: 1 2 3" },
  },
  {
    claim: "reads German week numbers",
    input: of(["KW 9/2026", "KW 10/2026", "KW 11/2026"], ";", "Woche"),
    series: { v: "week 2026-02-23: 1 2 3" },
  },
  {
    claim: "reads months",
    input: of(["2025-12", "2026-01", "2026-02"]),
    series: { v: "month 2025-12-01: 1 2 3" },
  },
  {
    claim: "reads months with the year behind",
    input: of(["12/2025", "01/2026", "02/2026"]),
    series: { v: "month 2025-12-01: 1 2 3" },
  },
  {
    claim: "reads months as 2025M12",
    input: of(["2025M12", "2026M01", "2026M02"]),
    series: { v: "month 2025-12-01: 1 2 3" },
  },
  {
    claim: "reads YYYYMM in a column called a month",
    input: of(["202512", "202601", "202602"], ",", "month"),
    series: { v: "month 2025-12-01: 1 2 3" },
  },
  {
    claim: "reads quarters",
    input: of(["2025-Q4", "2026-Q1", "2026-Q2"]),
    series: { v: "quarter 2025-10-01: 1 2 3" },
  },
  {
    claim: "reads quarters with the year behind",
    input: of(["Q4 2025", "Q1 2026", "Q2 2026"]),
    series: { v: "quarter 2025-10-01: 1 2 3" },
  },
  {
    claim: "reads years in a column called a year",
    input: of(["2023", "2024", "2025"], ",", "year"),
    series: { v: "year 2023-01-01: 1 2 3" },
  },
  {
    claim: "knows the day in front from one number above twelve",
    input: of(["11/03/2026", "12/03/2026", "13/03/2026"]),
    series: { v: "day 2026-03-11: 1 2 3" },
  },
  {
    claim: "knows the month in front from one number above twelve",
    input: of(["03/11/2026", "03/12/2026", "03/13/2026"]),
    series: { v: "day 2026-03-11: 1 2 3" },
  },
  {
    claim: "asks whether the day or the month is in front where no date tells",
    input: of(["03/04/2026", "04/04/2026", "05/04/2026"]),
    problems: ["date-order-unclear! line 2 date"],
    remedy: "dateOrder",
  },
  {
    claim: "takes the day in front when the settings say so",
    input: of(["03/04/2026", "04/04/2026", "05/04/2026"]),
    settings: { dateOrder: "day-first" },
    series: { v: "day 2026-04-03: 1 2 3" },
  },
  {
    claim: "takes the month in front when the settings say so",
    input: of(["03/04/2026", "04/04/2026", "05/04/2026"]),
    settings: { dateOrder: "month-first" },
    series: { v: "month 2026-03-01: 1 2 3" },
  },
  {
    claim: "refuses a column in which both the day and the month are in front",
    input: of(["13/03/2026", "03/14/2026", "15/03/2026"]),
    problems: ["mixed-date-orders! line 3 date"],
    remedy: "2026-11-30",
  },
  {
    claim: "reads dates with points as the day in front",
    input: of(["1.3.2026", "2.3.2026", "3.3.2026"], ";"),
    series: { v: "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "knows the day in front when only so thirteen months are evenly spaced",
    input: of(
      [...Array(13).keys()].map(
        (at) => `01/${String((at % 12) + 1).padStart(2, "0")}/${2024 + Math.floor(at / 12)}`,
      ),
    ),
    series: { v: "month 2024-01-01: 1 2 3 4 5 6 7 8 9 10 11 12 13" },
  },
  {
    claim: "asks all the same when twelve months are evenly spaced either way",
    input: of([...Array(12).keys()].map((at) => `01/${String(at + 1).padStart(2, "0")}/2025`)),
    problems: ["date-order-unclear! line 2 date"],
  },
  {
    claim: "reads two-digit years behind day and month",
    input: of(["29.03.26", "30.03.26", "31.03.26"], ";"),
    series: { v: "day 2026-03-29: 1 2 3" },
  },
  {
    claim: "refuses two-digit years that may stand in front",
    input: of(["26/03/01", "26/03/02", "26/03/03"]),
    problems: ["two-digit-years! line 2 date"],
    remedy: "four digits",
  },
  {
    claim: "reads English month names",
    input: of(["Jan 1 2026", "Jan 2 2026", "Jan 3 2026"]),
    series: { v: "day 2026-01-01: 1 2 3" },
  },
  {
    claim: "reads month names with weekdays and ordinals",
    input: of(['"Sunday, 1st March 2026"', '"Monday, 2nd March 2026"', '"Tuesday, 3rd March 2026"']),
    series: { v: "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "reads spreadsheet months such as Jan-26",
    input: of(["Nov-25", "Dec-25", "Jan-26"]),
    series: { v: "month 2025-11-01: 1 2 3" },
  },
  {
    claim: "reads month names in the locale of the settings",
    input: of(["1 de março de 2026", "2 de março de 2026", "3 de março de 2026"], ";", "data"),
    locale: "pt-PT",
    series: { v: "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "reads German months, accents or not",
    input: of(["Februar 2026", "März 2026", "April 2026"], ";", "Monat"),
    locale: "de-DE",
    series: { v: "month 2026-02-01: 1 2 3" },
  },
  {
    claim: "reads spreadsheet serial numbers in a column called a date",
    input: of(["46082", "46083", "46084"]),
    series: { v: "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "reads epoch seconds",
    input: of(["1772323200", "1772409600", "1772496000"], ",", "timestamp"),
    series: { v: "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "reads epoch milliseconds by the hour",
    input: of(["1772323200000", "1772326800000", "1772330400000"], ",", "ts"),
    series: { v: "hour 2026-03-01T00:00:00Z: 1 2 3" },
  },
  {
    claim: "takes midnights in UTC for the days they name",
    input: of(["2026-03-01T00:00:00Z", "2026-03-02T00:00:00Z", "2026-03-03T00:00:00Z"]),
    timeZone: "America/New_York",
    series: { v: "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "reads clock times with am and pm",
    input: of(["03/13/2026 11:00 PM", "03/14/2026 12:00 AM", "03/14/2026 1:00 AM"]),
    series: { v: "hour 2026-03-13T23:00:00Z: 1 2 3" },
  },
  {
    claim: "takes 24:00 for the start of the next day",
    input: of(["2026-03-01 23:00", "2026-03-01 24:00", "2026-03-02 01:00"]),
    series: { v: "hour 2026-03-01T23:00:00Z: 1 2 3" },
  },
  {
    claim: "places local hours by the zone of the settings",
    input: of(["2026-07-01 10:00", "2026-07-01 11:00", "2026-07-01 12:00"]),
    timeZone: "Europe/Lisbon",
    series: { v: "hour 2026-07-01T09:00:00Z: 1 2 3" },
  },
  {
    claim: "follows offsets in the cells before any zone",
    input: of(["2026-07-01T10:00+02:00", "2026-07-01T11:00+02:00", "2026-07-01T12:00+02:00"]),
    timeZone: "America/New_York",
    series: { v: "hour 2026-07-01T08:00:00Z: 1 2 3" },
  },
  {
    claim: "keeps both hours of the night clocks go back",
    input: of(["2026-10-25 01:00", "2026-10-25 02:00", "2026-10-25 02:00", "2026-10-25 03:00"]),
    timeZone: "Europe/Berlin",
    series: { v: "hour 2026-10-24T23:00:00Z: 1 2 3 4" },
  },
  {
    claim: "keeps both hours of that night in a table from new to old",
    input: of(["25.10.2026 03:00", "25.10.2026 02:00", "25.10.2026 02:00", "25.10.2026 01:00"], ";"),
    timeZone: "Europe/Berlin",
    series: { v: "hour 2026-10-24T23:00:00Z: 4 3 2 1" },
  },
  {
    claim: "leaves no gap for the hour clocks skip in spring",
    input: of(["2026-03-29 00:00", "2026-03-29 01:00", "2026-03-29 03:00", "2026-03-29 04:00"]),
    timeZone: "Europe/Berlin",
    series: { v: "hour 2026-03-28T23:00:00Z: 1 2 3 4" },
  },
  {
    claim: "says that a clock which shows the skipped hour is not the zone's",
    input: of(["2026-03-29 01:00", "2026-03-29 02:00", "2026-03-29 03:00"]),
    timeZone: "Europe/Berlin",
    series: { v: "hour 2026-03-29T00:00:00Z: 1 3" },
    problems: ["skipped-hour line 3 date"],
    remedy: "timeZone",
  },
  {
    claim: "reads hours of a zone half an hour off",
    input: of(["2026-03-01 10:00", "2026-03-01 11:00", "2026-03-01 12:00"]),
    timeZone: "Asia/Kolkata",
    series: { v: "hour 2026-03-01T04:30:00Z: 1 2 3" },
  },
  {
    claim: "says which cell is no date and leaves its row a gap",
    input: of(["2026-03-01", "2026-03-32", "2026-03-03", "2026-03-04"]),
    series: { v: "day 2026-03-01: 1 _ 3 4" },
    problems: ["bad-date line 3 date"],
  },
  {
    claim: "knows that 29 February needs a leap year",
    input: of(["2023-02-27", "2023-02-28", "2023-02-29", "2023-03-01"]),
    series: { v: "day 2023-02-27: 1 2 4" },
    problems: ["bad-date line 4 date"],
  },
  {
    claim: "refuses a column of dates without a year",
    input: of(["24-Jan", "25-Jan", "26-Jan"]),
    problems: ["no-dates! line 2 date"],
  },
  {
    claim: "says when the settings name a date column that holds none",
    input: "id,date,v\nx1,2026-03-01,1\nx2,2026-03-02,2\n",
    settings: { date: "id" },
    problems: ["no-dates! line 2 id"],
  },
  {
    claim: "names the nearest column when the settings name one that is not there",
    input: "date,v\n2026-03-01,1\n2026-03-02,2\n",
    settings: { date: "dat" },
    problems: ["no-such-column! dat"],
    remedy: '"date"',
  },
  {
    claim: "leaves out a row whose year is mistyped",
    input: of([
      "2026-03-01",
      "2026-03-02",
      "2206-03-03",
      "2026-03-04",
      "2026-03-05",
      "2026-03-06",
      "2026-03-07",
    ]),
    series: { v: "day 2026-03-01: 1 2 _ 4 5 6 7" },
    problems: ["lonely-date line 4 date"],
    remedy: "year",
  },
];
