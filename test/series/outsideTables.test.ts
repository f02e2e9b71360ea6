import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { dirname, join } from "node:path";
import { parse } from "csv-parse/sync";
import { describe, expect, it } from "vitest";
import { periodIndex } from "../../lib/series/periods.ts";
import { readTable } from "../../lib/series/readTable.ts";
import type { Period, Series } from "../../lib/series/series.ts";

// Tables as others published them, in the npm package vega-datasets. Expected values: the cells of the same file as
// csv-parse and Number read them; steps, starts and counts as the package's datapackage.json describes the data.

const require = createRequire(import.meta.url);
const folder = join(dirname(require.resolve("vega-datasets")), "..", "data");
const bytesOf = (file: string) => new Uint8Array(readFileSync(join(folder, file)));
const recordsOf = (text: string) => parse(text, { columns: true }) as Record<string, string>[];
const asOf = "2026-12-01T06:00:00Z";

/** Every cell of the file stands in the series at its own period, and nothing else does. */
function expectCells(
  series: readonly Series[],
  cells: readonly { series: string; date: string; value: string }[],
): void {
  const byName = new Map(series.map((one) => [one.name, one]));
  let matched = 0;
  for (const { series: name, date, value } of cells) {
    if (value === "") continue;
    const found = byName.get(name);
    if (!found) throw new Error(`series ${name} is missing`);
    expect(found.values[periodIndex(found.start, found.period, date)]).toBe(Number(value));
    matched++;
  }
  expect(series.reduce((sum, { observed }) => sum + observed, 0)).toBe(matched);
}

function read(input: Uint8Array | string, value: string) {
  const { series, problems, reading } = readTable(input, { values: value }, { asOf });
  expect(problems).toEqual([]);
  return { series, reading };
}

const wide: readonly [file: string, value: string, date: string, period: Period, length: number][] = [
  ["seattle-weather.csv", "temp_max", "date", "day", 1461],
  ["seattle-weather-hourly-normals.csv", "temperature", "date", "hour", 8759],
  ["co2-concentration.csv", "CO2", "Date", "month", 746],
  ["us-employment.csv", "nonfarm", "month", "month", 120],
  ["sp500-2000.csv", "close", "date", "day", 7411],
  ["global-temp.csv", "temp", "year", "year", 144],
];

describe("readTable, on tables of vega-datasets, told the value column only", () => {
  it.each(wide)("reads %s, column %s", (file, value, date, period, length) => {
    const { series } = read(bytesOf(file), value);
    expect(series).toHaveLength(1);
    expect(series[0].period).toBe(period);
    expect(series[0].values.length).toBe(length);
    const iso = (text: string) =>
      period === "year" ? `${text}-01-01` : period === "hour" ? `${text}Z` : text;
    expectCells(
      series,
      recordsOf(readFileSync(join(folder, file), "utf8")).map((record) => ({
        series: value,
        date: iso(record[date]),
        value: record[value],
      })),
    );
  });

  it("reads sp500.csv, whose dates are written out", () => {
    const { series } = read(bytesOf("sp500.csv"), "price");
    expect(series).toHaveLength(1);
    expect(series[0]).toMatchObject({ period: "month", start: "2000-01-01", observed: 123, gaps: 0 });
    expect([...series[0].values]).toEqual(
      recordsOf(readFileSync(join(folder, "sp500.csv"), "utf8")).map(({ price }) => Number(price)),
    );
  });

  it("reads stocks.csv as long, a series a symbol, one of which starts late", () => {
    const { series, reading } = read(bytesOf("stocks.csv"), "price");
    expect(reading?.shape).toBe("long");
    const iso = (text: string) => new Date(`${text} UTC`).toISOString().slice(0, 10);
    expectCells(
      series,
      recordsOf(readFileSync(join(folder, "stocks.csv"), "utf8")).map(({ symbol, date, price }) => ({
        series: symbol,
        date: iso(date),
        value: price,
      })),
    );
    expect(series.find(({ name }) => name === "GOOG")).toMatchObject({ start: "2004-08-01", gaps: 0 });
  });

  it("reads weather.csv as long, a series a town", () => {
    const { series } = read(bytesOf("weather.csv"), "temp_max");
    expectCells(
      series,
      recordsOf(readFileSync(join(folder, "weather.csv"), "utf8")).map((record) => ({
        series: record.location,
        date: record.date,
        value: record.temp_max,
      })),
    );
  });

  /** The package has these as JSON only; written as CSV by the rules of RFC 4180. */
  const asCsv = (file: string) => {
    const records = JSON.parse(readFileSync(join(folder, file), "utf8")) as Record<string, unknown>[];
    const cell = (value: unknown) =>
      /[",\n]/.test(String(value)) ? `"${String(value)}"` : String(value ?? "");
    const columns = Object.keys(records[0]);
    return [
      columns.join(","),
      ...records.map((record) => columns.map((name) => cell(record[name])).join(",")),
    ].join("\r\n");
  };

  it("reads gapminder as long, a series a country, every fifth year", () => {
    const text = asCsv("gapminder.json");
    const { series, reading } = read(text, "life_expect");
    expect(reading?.shape).toBe("long");
    expect(series.length).toBe(new Set(recordsOf(text).map(({ country }) => country)).size);
    expectCells(
      series,
      recordsOf(text).map(({ country, year, life_expect }) => ({
        series: country,
        date: `${year}-01-01`,
        value: life_expect,
      })),
    );
  });

  it("reads unemployment across industries as long, its months given as instants", () => {
    const text = asCsv("unemployment-across-industries.json");
    const { series } = read(text, "count");
    expect(series).toHaveLength(14);
    expectCells(
      series,
      recordsOf(text).map((record) => ({
        series: record.series,
        date: `${record.year}-${record.month.padStart(2, "0")}-01`,
        value: record.count,
      })),
    );
  });

  it("says what is missing where a table has no dates", () => {
    const { series, problems } = readTable(bytesOf("unemployment.tsv"), { values: "rate" }, { asOf });
    expect(series).toEqual([]);
    expect(problems).toMatchObject([{ code: "no-dates", line: 2, fatal: true }]);
  });
});
