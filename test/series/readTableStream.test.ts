import { Readable } from "node:stream";
import * as zlib from "node:zlib";
import { gzipSync } from "node:zlib";
import { describe, expect, it } from "vitest";
import { readTable } from "../../lib/series/readTable.ts";
import { readTableStream } from "../../lib/series/readTableStream.ts";
import type { Series } from "../../lib/series/series.ts";
import { arrowHours, arrowTable } from "./corpus/parquetFiles.ts";

const context = { asOf: "2026-12-01T06:00:00Z", table: "t" };
const text = (value: string) => new Uint8Array(Buffer.from(value));
const valuesOf = (series: readonly Series[]) =>
  Object.fromEntries(series.map(({ name, values }) => [name, [...values]]));

/** Rows of many days, larger than the head that is looked at before reading begins. */
function* longTable(days: number): Generator<Uint8Array> {
  yield text("date,shop,v,remark\n");
  for (let at = 0; at < days; at++) {
    const date = new Date(Date.UTC(1990, 0, 1 + at)).toISOString().slice(0, 10);
    yield text(`${date},Quay,${at},${"x".repeat(100)}\n${date},Mill,${at / 4},\n`);
  }
}

describe("readTableStream", () => {
  it("reads a table longer than its head, piece by piece", async () => {
    const days = 12_000;
    const { series, problems, reading } = await readTableStream(longTable(days), {}, context);
    expect(problems).toEqual([]);
    expect(reading?.rows).toEqual({ read: 2 * days, used: 2 * days, ignored: 0, later: 0 });
    expect(valuesOf(series)).toEqual({
      Quay: Array.from({ length: days }, (_, at) => at),
      Mill: Array.from({ length: days }, (_, at) => at / 4),
    });
  });

  it("says the line of trouble far behind the head, and asks about the whole column", async () => {
    async function* pieces() {
      yield text("date;v\n");
      // One and the same undecided day over and over: only the last rows tell the order.
      for (let at = 0; at < 250; at++) yield text("03/04/2026;1\n".repeat(1000));
      yield text("13/04/2026;1\n14/04/2026;oops\n15/04/2026;7\n");
    }
    const { series, problems, reading } = await readTableStream(
      pieces(),
      { combine: "sum", every: "day" },
      context,
    );
    expect(reading?.date).toMatchObject({ order: "day-first", how: '"13/04/2026" in line 250002' });
    expect(series[0].start).toBe("2026-04-03");
    expect(series[0].values[0]).toBe(250_000);
    expect(problems).toMatchObject([{ code: "bad-number", line: 250_003, column: "v", fatal: false }]);
  });

  it("goes over to Windows-1252 when bytes far behind the head are no UTF-8", async () => {
    async function* pieces() {
      yield text("date,shop,v\n");
      for (let at = 0; at < 5000; at++)
        yield text(`${new Date(Date.UTC(2000, 0, 1 + at)).toISOString().slice(0, 10)},Quay,${at}\n`);
      for (let at = 0; at < 3; at++)
        yield new Uint8Array(Buffer.from(`2026-11-0${at + 1},Caf\xe9,${at}\n`, "latin1"));
    }
    const { series, reading } = await readTableStream(pieces(), { seriesName: "shop" }, context);
    expect(series.map(({ name }) => name)).toEqual(["Quay", "Café"]);
    expect(reading?.encoding).toBe("windows-1252");
  });

  it("unpacks gzip as it comes, and names what is wrong with a file cut off", async () => {
    const packed = new Uint8Array(gzipSync("date,v\n2026-03-01,1\n2026-03-02,2\n"));
    const pieces = Array.from(packed, (byte) => Uint8Array.of(byte));
    const whole = await readTableStream(pieces, {}, context);
    expect(whole).toEqual(readTable(packed, {}, context));
    expect(valuesOf(whole.series)).toEqual({ v: [1, 2] });
    const cut = await readTableStream(pieces.slice(0, -9), {}, context);
    expect(cut.problems).toMatchObject([{ code: "bad-gzip", fatal: true }]);
  });

  it("says that no bytes at all are an empty file", async () => {
    expect((await readTableStream([], {}, context)).problems).toMatchObject([{ code: "empty", fatal: true }]);
  });

  it("passes on the fault of a source that breaks, plain or gzip", async () => {
    async function* broken(first: Uint8Array) {
      yield first;
      throw new Error("connection lost");
    }
    await expect(readTableStream(broken(text("date,v\n")), {}, context)).rejects.toThrow("connection lost");
    const packed = new Uint8Array(gzipSync("date,v\n"));
    await expect(readTableStream(broken(packed.subarray(0, 12)), {}, context)).rejects.toThrow(
      "connection lost",
    );
  });

  it("lets go of the source when the table is refused half-way", async () => {
    const source = Readable.from(
      (function* () {
        for (;;) yield text(`"${"x".repeat(1000)}`);
      })(),
    );
    const { problems } = await readTableStream(source, {}, context);
    expect(problems).toMatchObject([{ code: "quote-not-closed", line: 1 }]);
    expect(source.destroyed).toBe(true);
  });
});

describe("readTable and readTableStream", () => {
  it.each([
    [{ asOf: "soon" }],
    [{ asOf: new Date(Number.NaN) }],
    [{ asOf: "2026-12-01T06:00:00Z", timeZone: "Mars/Base" }],
  ])("throw a RangeError for a context that is wrong (%j)", async (wrong) => {
    expect(() => readTable("date,v\n", {}, wrong)).toThrow(RangeError);
    await expect(readTableStream([], {}, wrong)).rejects.toThrow(RangeError);
  });
});

describe("readTableStream, on Parquet files of Apache Arrow", () => {
  const expected = {
    loans: [1, NaN, 3, 4, 5],
    euro: [1.5, 2.25, NaN, 0.1, -3],
    price: [1.1, 2.2, NaN, 4.4, 5.5],
  };
  const hasZstandard = "zstdDecompressSync" in zlib;

  it.each(["snappy", "gzip"] as const)(
    "reads dates, integers, doubles, decimals and nulls, packed with %s",
    async (codec) => {
      const { series, problems, reading } = await readTableStream(
        [arrowTable[codec]],
        { seriesName: null },
        context,
      );
      expect(problems).toEqual([]);
      expect(valuesOf(series)).toEqual(expected);
      expect(series.every(({ start, period }) => start === "2026-03-01" && period === "day")).toBe(true);
      expect(reading).toMatchObject({ format: "parquet", delimiter: null, headerLine: null });
    },
  );

  it("reads a long table", async () => {
    const { series } = await readTableStream(
      [arrowTable.snappy],
      { seriesName: "shop", values: "loans" },
      context,
    );
    expect(valuesOf(series)).toEqual({ Quay: [1, NaN, 3, NaN, 5], Mill: [4] });
  });

  it("reads Zstandard where Node has it, and says what else to use where not", async () => {
    const { series, problems } = await readTableStream([arrowTable.zstd], { seriesName: null }, context);
    if (hasZstandard) expect(valuesOf(series)).toEqual(expected);
    else {
      expect(problems).toMatchObject([{ code: "bad-parquet", fatal: true }]);
      expect(problems[0].remedy).toContain("Snappy");
    }
  });

  it("reads instants", async () => {
    const { series } = await readTableStream([arrowHours], {}, context);
    expect(series[0]).toMatchObject({ period: "hour", start: "2026-03-01T00:00:00Z" });
    expect(valuesOf(series)).toEqual({ v: [1, 2, 3, 4] });
  });

  it("says that a file is broken", async () => {
    for (const length of [4, 100, arrowTable.snappy.length - 3]) {
      const { problems } = await readTableStream([arrowTable.snappy.subarray(0, length)], {}, context);
      expect(problems).toMatchObject([{ code: "bad-parquet", fatal: true }]);
    }
  });

  it("sends the caller of readTable to the stream", () => {
    expect(readTable(arrowTable.snappy, {}, context).problems).toMatchObject([
      { code: "parquet", fatal: true },
    ]);
  });
});
