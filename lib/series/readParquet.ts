import * as zlib from "node:zlib";
import type { Compressors } from "hyparquet";
import type { Row } from "./layout.ts";
import type { Complain } from "./problems.ts";
import { openSession } from "./session.ts";
import { TableFault } from "./tableFault.ts";
import { planTable } from "./tablePlan.ts";
import type { ReadContext, TableResult } from "./tableResult.ts";
import type { TableSettings } from "./tableSettings.ts";

/** Rows looked at before reading begins. */
const headRows = 20_000;
/** Rows read at a time. */
const batchRows = 50_000;

// Snappy and plain pages are read by hyparquet itself; Zstandard needs Node 22.15 or newer.
const { zstdDecompressSync } = zlib as { zstdDecompressSync?: (bytes: Uint8Array) => Uint8Array };
const compressors: Compressors = {
  GZIP: (bytes) => zlib.gunzipSync(bytes),
  BROTLI: (bytes) => zlib.brotliDecompressSync(bytes),
  ...(zstdDecompressSync ? { ZSTD: (bytes: Uint8Array) => zstdDecompressSync(bytes) } : {}),
};

/** A value as the text a CSV export would have written: dates and instants as ISO, numbers in full. */
function cellText(value: unknown): string {
  if (value === null || value === undefined) return "";
  if (value instanceof Date) {
    if (Number.isNaN(value.getTime())) return "";
    const text = value.toISOString();
    return text.endsWith("T00:00:00.000Z") ? text.slice(0, 10) : text;
  }
  if (typeof value === "number") return Number.isFinite(value) ? String(value) : "";
  if (typeof value === "string" || typeof value === "bigint" || typeof value === "boolean")
    return String(value);
  return "";
}

/**
 * Reads a Parquet file, held whole, batch by batch through the same steps as a table of text. Lines of problems count
 * the rows, with the names as line 1.
 *
 * @throws TableFault when it is no readable Parquet file or table
 */
export async function readParquet(
  bytes: Uint8Array,
  settings: TableSettings,
  context: ReadContext,
  complain: Complain,
): Promise<TableResult> {
  // Loaded when asked for: few stores hold Parquet, and a function's start need not wait for it.
  const { parquetMetadataAsync, parquetReadObjects, parquetSchema } = await import("hyparquet");
  const file = bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength) as ArrayBuffer;
  /** What the library throws at a broken file is the file's fault; anything else would be ours. */
  const reading = async <T>(work: () => Promise<T>): Promise<T> => {
    try {
      return await work();
    } catch (error) {
      throw new TableFault(
        complain(
          "bad-parquet",
          true,
          `the Parquet file cannot be opened (${error instanceof Error ? error.message : String(error)})`,
          "write it again, compressed with Snappy or not at all, or save it as CSV",
        ),
      );
    }
  };
  const metadata = await reading(() => parquetMetadataAsync(file));
  const names = parquetSchema(metadata).children.map(({ element }) => element.name);
  const count = Number(metadata.num_rows);
  const rowsFrom = async (from: number, size: number): Promise<Row[]> => {
    const rowEnd = Math.min(count, from + size);
    const objects = await reading(() =>
      parquetReadObjects({ file, metadata, rowStart: from, rowEnd, compressors }),
    );
    return objects.map((object, at) => ({
      line: from + at + 2,
      cells: names.map((name) => cellText(object[name])),
    }));
  };
  const head = await rowsFrom(0, headRows);
  const sample = { rows: [{ line: 1, cells: names }, ...head], comments: [] };
  const fixed = { ...settings, headerLine: 1, decimal: "." as const };
  const plan = planTable(sample, count <= headRows, ",", fixed, context.locale ?? "en-GB", complain);
  const session = openSession(plan, fixed, context, complain);
  for (const { cells, line } of head) session.row(cells, line);
  for (let from = headRows; from < count; from += batchRows)
    for (const { cells, line } of await rowsFrom(from, batchRows)) session.row(cells, line);
  return session.finish({ format: "parquet", compressed: false, encoding: null });
}
