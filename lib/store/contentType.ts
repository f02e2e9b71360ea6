const types: Readonly<Record<string, string>> = {
  csv: "text/csv; charset=utf-8",
  gz: "application/gzip",
  html: "text/html; charset=utf-8",
  json: "application/json",
  svg: "image/svg+xml",
  txt: "text/plain; charset=utf-8",
};

/**
 * The media type a browser needs to open an object, by the suffix of its key.
 * @example contentType("forecasts/loans/latest.csv") // "text/csv; charset=utf-8"
 */
export function contentType(key: string): string {
  const suffix = key.slice(key.lastIndexOf(".") + 1).toLowerCase();
  return types[suffix] ?? "application/octet-stream";
}
