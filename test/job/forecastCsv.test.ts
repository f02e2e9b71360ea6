import { parse } from "csv-parse/sync";
import { describe, expect, it } from "vitest";
import { forecastCsv } from "../../lib/job/forecastCsv.ts";
import type { SeriesFacts } from "../../lib/words/facts.ts";

function facts(series: string, point: number[], low: number[], high: number[]): SeriesFacts {
  const forecast = {
    periods: point.map((_, step) => `2026-01-0${step + 1}`),
    point,
    intervals: [{ level: 80, low, high }],
  };
  return { series, forecast } as unknown as SeriesFacts;
}

describe("the forecast file", () => {
  it("has one row a series and period, with our columns", () => {
    const rows = parse(forecastCsv([facts("Quay", [10.25, 11], [8, 9], [12.5, 13])]));
    expect(rows).toEqual([
      ["series", "period", "forecast", "low80", "high80"],
      ["Quay", "2026-01-01", "10.25", "8", "12.5"],
      ["Quay", "2026-01-02", "11", "9", "13"],
    ]);
  });

  it.each(["=1+1", "+1", "-2", "@SUM(A1)", "\tx"])(
    "keeps a series named %j from becoming a formula",
    (name) => {
      // OWASP, CSV injection: a leading apostrophe.
      expect(parse(forecastCsv([facts(name, [1], [0], [2])]))[1][0]).toBe(`'${name}`);
    },
  );

  it("quotes a name with a comma, a quote or a line break so that it reads back", () => {
    const name = 'a,"b"\nc';
    expect(parse(forecastCsv([facts(name, [1], [0], [2])]))[1][0]).toBe(name);
  });

  it("keeps low, forecast and high in order however large or small the numbers", () => {
    for (const scale of [1e-12, 1e-3, 1, 1e6, 1e12]) {
      const text = forecastCsv([facts("x", [1.23456789 * scale], [1.2345 * scale], [1.2346 * scale])]);
      const [, , point, low, high] = parse(text)[1].map(Number);
      expect(low).toBeLessThanOrEqual(point);
      expect(point).toBeLessThanOrEqual(high);
      expect(Math.abs(point - 1.23456789 * scale)).toBeLessThan(1e-8 * scale);
    }
  });
});
