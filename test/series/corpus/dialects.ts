import { gzipSync } from "node:zlib";
import { type CorpusCase, latin, utf16 } from "./case.ts";

const three = "day 2026-03-01: 1.5 2 3.25";

export const dialects: readonly CorpusCase[] = [
  {
    claim: "reads commas",
    input: "date,v\n2026-03-01,1.5\n2026-03-02,2\n2026-03-03,3.25\n",
    series: { v: three },
  },
  {
    claim: "reads semicolons with decimal commas",
    input: "date;v\n2026-03-01;1,5\n2026-03-02;2\n2026-03-03;3,25\n",
    series: { v: three },
  },
  {
    claim: "reads tabs",
    input: "date\tv\n2026-03-01\t1.5\n2026-03-02\t2\n2026-03-03\t3.25\n",
    series: { v: three },
  },
  {
    claim: "reads pipes",
    input: "date|v\n2026-03-01|1.5\n2026-03-02|2\n2026-03-03|3.25\n",
    series: { v: three },
  },
  {
    claim: "reads blanks around cells",
    input: "date , v\n 2026-03-01 , 1.5 \n2026-03-02,  2\n2026-03-03 ,3.25\n",
    series: { v: three },
  },
  {
    claim: "reads CRLF line ends",
    input: "date,v\r\n2026-03-01,1.5\r\n2026-03-02,2\r\n2026-03-03,3.25\r\n",
    series: { v: three },
  },
  {
    claim: "reads line ends of a return alone",
    input: "date,v\r2026-03-01,1.5\r2026-03-02,2\r2026-03-03,3.25",
    series: { v: three },
  },
  {
    claim: "reads a last line without an end",
    input: "date,v\n2026-03-01,1.5\n2026-03-02,2\n2026-03-03,3.25",
    series: { v: three },
  },
  {
    claim: "reads quoted cells, with commas, quotes and line ends in names",
    input:
      '"date","a ""b"", c","d\ne"\r\n"2026-03-01","1.5","4"\r\n"2026-03-02","2","5"\r\n"2026-03-03","3.25","6"\r\n',
    series: { 'a "b", c': three, "d e": "day 2026-03-01: 4 5 6" },
  },
  {
    claim: "reads a semicolon table whose quoted cells hold commas and semicolons",
    input: 'date;"x; y";note\n2026-03-01;1,5;"a, b; c"\n2026-03-02;2;"d, e"\n2026-03-03;3,25;""\n',
    series: { "x; y": three },
  },
  {
    claim: "takes an inch sign inside a bare cell for a character",
    input: 'date,v,size\n2026-03-01,1.5,5" pipe\n2026-03-02,2,6" pipe\n2026-03-03,3.25,7"\n',
    series: { v: three },
  },
  {
    claim: "drops a UTF-8 byte order mark",
    input: new Uint8Array(Buffer.from("\uFEFFdate,v\n2026-03-01,1.5\n2026-03-02,2\n2026-03-03,3.25\n")),
    series: { v: three },
  },
  {
    claim: "reads UTF-16 with a byte order mark",
    input: utf16("date\tprés\n2026-03-01\t1,5\n2026-03-02\t2\n2026-03-03\t3,25\n", "le", true),
    series: { prés: three },
  },
  {
    claim: "reads big-endian UTF-16 with a byte order mark",
    input: utf16("date;v\n2026-03-01;1,5\n2026-03-02;2\n2026-03-03;3,25\n", "be", true),
    series: { v: three },
  },
  {
    claim: "reads UTF-16 without a mark by its zero bytes",
    input: utf16("date,v\n2026-03-01,1.5\n2026-03-02,2\n2026-03-03,3.25\n", "le", false),
    series: { v: three },
  },
  {
    claim: "reads Windows-1252",
    input: latin("Datum;B\xfccher \x80\n2026-03-01;1,5\n2026-03-02;2\n2026-03-03;3,25\n"),
    series: { "Bücher €": three },
  },
  {
    claim: "reads gzip by its first bytes",
    input: new Uint8Array(gzipSync("date,v\n2026-03-01,1.5\n2026-03-02,2\n2026-03-03,3.25\n")),
    series: { v: three },
  },
  {
    claim: "skips blank lines and comment lines, even with a quote in them",
    input:
      '# made by the till, size 5"\n\ndate,v\n\n2026-03-01,1.5\n# "checked\n2026-03-02,2\n,\n2026-03-03,3.25\n\n',
    series: { v: three },
  },
  {
    claim: "takes a comment for the header when nothing else is",
    input: "# station 7\n#date,v\n2026-03-01,1.5\n2026-03-02,2\n2026-03-03,3.25\n",
    series: { v: three },
  },
  {
    claim: "skips title lines above the header",
    input:
      "Tool library;;\nLoans 2026;;printed 04.03.2026\n\ndate;v;w\n2026-03-01;1,5;1\n2026-03-02;2;2\n2026-03-03;3,25;3\n",
    series: { v: three, w: "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "skips a line of units below the header",
    input: "date,v,w\n,EUR,pcs\n2026-03-01,1.5,1\n2026-03-02,2,2\n2026-03-03,3.25,3\n",
    series: { v: three, w: "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "skips total lines at the end",
    input: "date,v\n2026-03-01,1.5\n2026-03-02,2\n2026-03-03,3.25\nTotal,6.75\n,6.75\nprinted by the till\n",
    series: { v: three },
  },
  {
    claim: "skips subtotals between the rows",
    input: "date,v\n2026-03-01,1.5\n2026-03-02,2\nSubtotal,3.5\n2026-03-03,3.25\nGrand total,6.75\n",
    series: { v: three },
  },
  {
    claim: "skips the header when it comes again in the middle",
    input: "date,v\n2026-03-01,1.5\n2026-03-02,2\ndate,v\n2026-03-03,3.25\n",
    series: { v: three },
  },
  {
    claim: "leaves out empty columns of a spreadsheet's width",
    input: "date,v,,,\n2026-03-01,1.5,,,\n2026-03-02,2,,,\n2026-03-03,3.25,,,\n,,,,\n",
    series: { v: three },
  },
  {
    claim: "reads rows cut short as ending in gaps",
    input: "date,v,w\n2026-03-01,1.5,1\n2026-03-02,2\n2026-03-03,3.25,3\n",
    series: { v: three, w: "day 2026-03-01: 1 _ 3" },
  },
  {
    claim: "leaves out the row numbers a data frame wrote",
    input: ",date,v\n0,2026-03-01,1.5\n1,2026-03-02,2\n2,2026-03-03,3.25\n",
    series: { v: three },
  },
  {
    claim: "names the second of two equal columns (2)",
    input: "date,v,v\n2026-03-01,1.5,1\n2026-03-02,2,2\n2026-03-03,3.25,3\n",
    series: { v: three, "v (2)": "day 2026-03-01: 1 2 3" },
  },
  {
    claim: "finds the date column wherever it stands",
    input: "v,note,date\n1.5,a,2026-03-01\n2,b,2026-03-02\n3.25,c,2026-03-03\n",
    series: { v: three },
  },
  {
    claim: "takes the header line the settings give",
    input: "x,y\ndate,v\n2026-03-01,1.5\n2026-03-02,2\n2026-03-03,3.25\n",
    settings: { headerLine: 2 },
    series: { v: three },
  },
];
