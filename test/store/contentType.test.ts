import { describe, expect, it } from "vitest";
import { contentType } from "../../lib/store/contentType.ts";

describe("contentType", () => {
  it.each([
    ["forecasts/a/latest.csv", "text/csv; charset=utf-8"],
    ["REPORT.HTML", "text/html; charset=utf-8"],
    ["runs/2026.11/plan.json", "application/json"],
    ["chart.svg", "image/svg+xml"],
    ["notes.txt", "text/plain; charset=utf-8"],
    ["series/a.csv.gz", "application/gzip"],
    ["csv", "text/csv; charset=utf-8"],
    ["runs.json/none", "application/octet-stream"],
  ])("of %s is %s", (key, type) => {
    expect(contentType(key)).toBe(type);
  });
});
