import * as fc from "fast-check";
import { describe, expect, it } from "vitest";
import { readTable } from "../../lib/series/readTable.ts";
import { readTableStream } from "../../lib/series/readTableStream.ts";
import type { TableResult } from "../../lib/series/tableResult.ts";
import { arbitraryDialect, arbitraryTable } from "./arbitraryTables.ts";
import { type Dialect, type Table, writeTable } from "./writeTable.ts";

const context = { asOf: "2040-01-01T06:00:00Z", table: "t" };

function expectSame(result: TableResult, table: Table): void {
  expect(result.problems).toEqual([]);
  expect(result.series.map(({ name }) => name)).toEqual(table.names);
  for (const [at, series] of result.series.entries()) {
    expect(series.period).toBe(table.period);
    // The 1 January of a quarter or month table is its start; a day or week table starts at its first date.
    expect(series.start <= table.dates[0]).toBe(true);
    expect([...series.values]).toEqual(
      table.columns[at].map((text) => (text === null ? Number.NaN : Number(text))),
    );
  }
}

const settingsOf = ({ decimal, date }: Dialect) => ({
  decimal,
  dateOrder: date === "month-first" ? ("month-first" as const) : ("day-first" as const),
});

describe("readTable, on random series in random dialects", () => {
  it("reads back the same numbers when told decimal mark and date order", () => {
    fc.assert(
      fc.property(arbitraryTable, arbitraryDialect, (table, dialect) => {
        // A quarter of months tells months from quarters only by its gaps: the step is told as well.
        const settings = { ...settingsOf(dialect), every: table.period };
        expectSame(readTable(writeTable(table, dialect), settings, context), table);
      }),
      { numRuns: 400 },
    );
  });

  it("reads back the same numbers without any settings, or asks", () => {
    let asked = 0;
    let read = 0;
    fc.assert(
      fc.property(arbitraryTable, arbitraryDialect, (table, dialect) => {
        const result = readTable(writeTable(table, dialect), {}, context);
        if (result.problems.some(({ fatal }) => fatal)) {
          asked++;
          expect(result.series).toEqual([]);
          expect(result.problems.map(({ code }) => code)).toEqual([
            expect.stringMatching(/^(?:date-order-unclear|decimal-unclear)$/),
          ]);
        } else {
          read++;
          expectSame(result, table);
        }
      }),
      { numRuns: 600 },
    );
    expect(read).toBeGreaterThan(4 * asked);
  });

  it("reads the same from pieces cut anywhere", async () => {
    await fc.assert(
      fc.asyncProperty(
        arbitraryTable,
        arbitraryDialect,
        fc.array(fc.integer({ min: 1, max: 400 }), { minLength: 1, maxLength: 20 }),
        async (table, dialect, sizes) => {
          const bytes = writeTable(table, dialect);
          const pieces: Uint8Array[] = [];
          for (let at = 0; at < bytes.length; at += pieces.at(-1)?.length ?? 1)
            pieces.push(bytes.subarray(at, at + sizes[pieces.length % sizes.length]));
          const settings = settingsOf(dialect);
          expect(await readTableStream(pieces, settings, context)).toEqual(
            readTable(bytes, settings, context),
          );
        },
      ),
      { numRuns: 150 },
    );
  });
});

describe("readTable, on bytes of any kind", () => {
  const told = ({ series, problems }: TableResult) => {
    for (const { values } of series)
      expect(values.every((value) => Number.isNaN(value) || Number.isFinite(value))).toBe(true);
    expect(series.length > 0 || problems.some(({ fatal }) => fatal)).toBe(true);
  };

  it("reads series or says why not, for random bytes", () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 3000 }), (bytes) => told(readTable(bytes, {}, context))),
      {
        numRuns: 500,
      },
    );
  });

  it("reads series or says why not, for random texts of a table's characters", () => {
    const characters = fc.constantFrom(...'0123456789-/.,;:|\t\r\n" #aWQTZ€()');
    fc.assert(
      fc.property(fc.string({ unit: characters, maxLength: 600 }), (text) => {
        told(readTable(text, {}, context));
        told(readTable(`date,v\n${text}`, {}, context));
        told(readTable(`date,v\n2026-01-01,1\n2026-01-02,2\n${text}`, {}, context));
      }),
      { numRuns: 700 },
    );
  });

  it("reads series or says why not, for good tables with a few bytes changed", () => {
    fc.assert(
      fc.property(
        arbitraryTable,
        arbitraryDialect,
        fc.array(fc.tuple(fc.nat(), fc.integer({ min: 0, max: 255 })), { minLength: 1, maxLength: 6 }),
        (table, dialect, changes) => {
          const bytes = writeTable(table, dialect);
          for (const [at, byte] of changes) bytes[at % bytes.length] = byte;
          told(readTable(bytes, {}, context));
        },
      ),
      { numRuns: 400 },
    );
  });
});
