import { gunzipSync } from "node:zlib";
import { createByteDecoder } from "./byteDecoder.ts";
import { isGzip, isParquet } from "./decode.ts";
import { type Complain, complainer } from "./problems.ts";
import { TableFault } from "./tableFault.ts";
import type { ReadContext, TableResult } from "./tableResult.ts";
import type { TableSettings } from "./tableSettings.ts";
import { createTextReader } from "./textReader.ts";
import { zoneOffset } from "./zone.ts";

/** A bomb of zeros is not unpacked further than this. */
const mostUnpacked = 1 << 30;

function unpacked(bytes: Uint8Array, complain: Complain): Uint8Array {
  try {
    return gunzipSync(bytes, { maxOutputLength: mostUnpacked });
  } catch (error) {
    throw new TableFault(badGzip(error, complain));
  }
}

export const badGzip = (error: unknown, complain: Complain) =>
  complain(
    "bad-gzip",
    true,
    `the compressed file cannot be opened (${error instanceof Error ? error.message : String(error)})`,
    "compress it again, or store it as plain CSV",
  );

/** @throws RangeError when `asOf` is no instant or the time zone is unknown: the caller's mistake, not the table's */
export function requireContext({ asOf, timeZone }: ReadContext): void {
  if (Number.isNaN(new Date(asOf).getTime()))
    throw new RangeError(`readTable: asOf must be an ISO instant, received ${JSON.stringify(asOf)}`);
  zoneOffset(0, timeZone ?? "UTC");
}

/** A table that cannot be read as a result with its one problem; any other error is a fault of ours and goes on. */
export function failedResult(error: unknown): TableResult {
  if (error instanceof TableFault) return { series: [], problems: [error.problem], reading: null };
  throw error;
}

/**
 * Reads a table of dates and numbers, as tills, booking systems and spreadsheets write them, into regular series.
 * Takes text or bytes, also gzip. What was taken for what stands in `reading`; what is wrong stands in `problems`, with
 * line and remedy; where the table leaves a doubt it asks for a setting and guesses nothing. Periods without a value
 * are `NaN`; a series runs from its first to its last value. The period that holds `asOf` is not over: it is left out.
 * Parquet needs `readTableStream`.
 *
 * @example readTable("day,calls\n2026-11-28,35\n2026-11-29,66\n", {}, { asOf: "2026-11-30T06:00:00Z" }).series[0].values // [35, 66]
 * @throws RangeError when `asOf` is no instant or the time zone is unknown
 */
export function readTable(
  input: string | Uint8Array,
  settings: TableSettings,
  context: ReadContext,
): TableResult {
  requireContext(context);
  const complain = complainer(context.table ?? "table");
  try {
    const reader = createTextReader(settings, context, complain);
    if (typeof input === "string") {
      reader.push(input.replace(/^\uFEFF/, ""));
      return reader.finish({ format: "text", compressed: false, encoding: null });
    }
    if (isParquet(input))
      throw new TableFault(
        complain(
          "parquet",
          true,
          "the file is a Parquet file",
          "read it with readTableStream, or save it as CSV",
        ),
      );
    const compressed = isGzip(input);
    const decoder = createByteDecoder(settings.encoding, complain);
    reader.push(decoder.push(compressed ? unpacked(input, complain) : input));
    reader.push(decoder.end());
    return reader.finish({ format: "text", compressed, encoding: decoder.encoding() });
  } catch (error) {
    return failedResult(error);
  }
}
