import { Readable } from "node:stream";
import { createGunzip } from "node:zlib";
import { concatenated, createByteDecoder } from "./byteDecoder.ts";
import { isGzip, isParquet } from "./decode.ts";
import { type Complain, complainer } from "./problems.ts";
import { badGzip, failedResult, requireContext } from "./readTable.ts";
import { TableFault } from "./tableFault.ts";
import type { ReadContext, TableResult } from "./tableResult.ts";
import type { TableSettings } from "./tableSettings.ts";
import { createTextReader } from "./textReader.ts";

type Pieces = AsyncIterable<Uint8Array> | Iterable<Uint8Array>;

/** Parquet has its table of contents at the end, so that the file must be held whole. */
const largestParquet = 300_000_000;

/** The first four bytes or more, and all pieces with them. */
async function peek(chunks: Pieces): Promise<{ head: Uint8Array; all: AsyncGenerator<Uint8Array> }> {
  const iterator =
    Symbol.asyncIterator in chunks ? chunks[Symbol.asyncIterator]() : chunks[Symbol.iterator]();
  const first: Uint8Array[] = [];
  let held = 0;
  while (held < 4) {
    const next = await iterator.next();
    if (next.done) break;
    first.push(next.value);
    held += next.value.length;
  }
  const head = concatenated(first, held);
  async function* all() {
    try {
      yield head;
      for (let next = await iterator.next(); !next.done; next = await iterator.next()) yield next.value;
    } finally {
      // The source is let go even when the table is given up half-way.
      await iterator.return?.();
    }
  }
  return { head, all: all() };
}

async function readParquetPieces(
  pieces: AsyncIterable<Uint8Array>,
  settings: TableSettings,
  context: ReadContext,
  complain: Complain,
): Promise<TableResult> {
  const held: Uint8Array[] = [];
  let length = 0;
  for await (const piece of pieces) {
    held.push(piece);
    length += piece.length;
    if (length > largestParquet)
      throw new TableFault(
        complain("too-large", true, "the Parquet file is larger than 300 MB", "split it, or save it as CSV"),
      );
  }
  const { readParquet } = await import("./readParquet.ts");
  return readParquet(concatenated(held, length), settings, context, complain);
}

/**
 * `readTable` for pieces of bytes: CSV, gzip and Parquet, by their first bytes. Text is read as it comes, so that
 * memory holds the series and not the file: a gigabyte of rows, or ten thousand series, takes less than 512 MB.
 *
 * @example await readTableStream(createReadStream("till.csv.gz"), { every: "day", combine: "sum" }, { asOf })
 * @throws whatever the source of the pieces throws; RangeError as `readTable`
 */
export async function readTableStream(
  chunks: Pieces,
  settings: TableSettings,
  context: ReadContext,
): Promise<TableResult> {
  requireContext(context);
  const complain = complainer(context.table ?? "table");
  try {
    const { head, all } = await peek(chunks);
    if (isParquet(head)) return await readParquetPieces(all, settings, context, complain);
    const compressed = isGzip(head);
    const decoder = createByteDecoder(settings.encoding, complain);
    const reader = createTextReader(settings, context, complain);
    for await (const piece of compressed ? gunzipped(all, complain) : all) reader.push(decoder.push(piece));
    reader.push(decoder.end());
    return reader.finish({ format: "text", compressed, encoding: decoder.encoding() });
  } catch (error) {
    return failedResult(error);
  }
}

async function* gunzipped(pieces: AsyncIterable<Uint8Array>, complain: Complain): AsyncGenerator<Uint8Array> {
  let sourceError: unknown;
  async function* watched() {
    try {
      yield* pieces;
    } catch (error) {
      sourceError = error;
      throw error;
    }
  }
  const source = Readable.from(watched(), { objectMode: false });
  const unpacking = createGunzip();
  source.on("error", (error) => unpacking.destroy(error));
  try {
    yield* source.pipe(unpacking);
  } catch (error) {
    // A fault of the store is not the table's.
    if (sourceError !== undefined) throw sourceError;
    throw new TableFault(badGzip(error, complain));
  } finally {
    source.destroy();
  }
}
