/** An instant as ISO text to the second: `2026-11-30T06:00:00Z`. @throws RangeError when it is no instant */
export function asOfText(asOf: Date | string): string {
  const date = typeof asOf === "string" ? new Date(asOf) : asOf;
  if (Number.isNaN(date.getTime()))
    throw new RangeError(`asOf must be an ISO instant, received "${String(asOf)}"`);
  return `${date.toISOString().slice(0, 19)}Z`;
}

/** The instant as it stands in keys: colons are not safe in file names everywhere. */
export const asOfKey = (asOf: string) => asOf.replaceAll(":", "-");

/** The instant a key part stands for, or `undefined` when it is no such part. */
export function asOfFromKey(part: string): string | undefined {
  const match = /^(\d{4}-\d{2}-\d{2}T\d{2})-(\d{2})-(\d{2}Z)$/.exec(part);
  return match ? `${match[1]}:${match[2]}:${match[3]}` : undefined;
}

export const settingsKey = "settings.json";
export const seriesPrefix = "series/";
export const modelPrefix = (table: string) => `models/${table}/`;
export const modelKey = (table: string, asOf: string) => `${modelPrefix(table)}${asOfKey(asOf)}.json`;
/** The same of a table of many series, compressed. */
export const packedModelKey = (table: string, asOf: string) => `${modelKey(table, asOf)}.gz`;
export const forecastKey = (table: string, asOf: string) => `forecasts/${table}/${asOfKey(asOf)}.csv`;
export const latestForecastKey = (table: string) => `forecasts/${table}/latest.csv`;
export const runPrefix = (asOf: string) => `runs/${asOfKey(asOf)}/`;
export const planKey = (asOf: string) => `${runPrefix(asOf)}plan.json`;
export const summaryKey = (asOf: string) => `${runPrefix(asOf)}summary.json`;
export const problemsKey = (asOf: string, table: string) => `${runPrefix(asOf)}problems/${table}.json`;

/** Endings a table's file may have; the first that exists is the table. */
export const tableEndings = [".csv", ".csv.gz", ".tsv", ".tsv.gz", ".txt", ".parquet"] as const;

/** The table a key under `series/` holds, or `undefined` for a file of another kind. */
export function tableOfKey(key: string): string | undefined {
  const ending = [...tableEndings].sort((a, b) => b.length - a.length).find((one) => key.endsWith(one));
  return ending && key.startsWith(seriesPrefix) ? key.slice(seriesPrefix.length, -ending.length) : undefined;
}

/** Why a table name cannot be used in keys, or `undefined` when it can. */
export function tableNameFault(table: string): string | undefined {
  if (table.length === 0) return "is empty";
  if (new TextEncoder().encode(table).length > 200) return "is longer than 200 bytes";
  if (/[\p{Cc}\p{Cf}\\:*?"<>|]/u.test(table)) return "holds a control, direction or reserved character";
  if (table.split("/").some((part) => part === "" || part === "." || part === ".." || part.endsWith(" ")))
    return "holds an empty, dotted or space-ended folder name";
  return undefined;
}
