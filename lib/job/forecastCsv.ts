import type { SeriesFacts } from "../words/facts.ts";

/** Text cells are quoted where needed, and cannot start a formula in a spreadsheet (OWASP, CSV injection). */
function textCell(text: string): string {
  const safe = /^[=+\-@\t\r\n]/.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/** The shortest decimal that is true to six significant digits of the range's width, and reads back as a number. */
function numberCell(value: number, width: number): string {
  if (Number.isInteger(value)) return String(value);
  const scale = Math.max(Math.abs(width), Math.abs(value) * 1e-9, Number.MIN_VALUE);
  const digits = Math.min(100, Math.max(0, 4 - Math.floor(Math.log10(scale))));
  return String(Number(value.toFixed(digits)));
}

/** The forecasts of one table as people open them: `series,period,forecast,low80,high80,…`, one row a period. */
export function forecastCsv(series: readonly SeriesFacts[]): string {
  const levels = series[0]?.forecast.intervals.map((one) => one.level) ?? [];
  const header = [
    "series",
    "period",
    "forecast",
    ...levels.flatMap((level) => [`low${level}`, `high${level}`]),
  ];
  const rows = series.flatMap((facts) =>
    facts.forecast.periods.map((period, step) => {
      const { point, intervals } = facts.forecast;
      const widest = intervals.at(-1);
      const width = widest ? widest.high[step] - widest.low[step] : point[step];
      const bounds = intervals.flatMap(({ low, high }) => [
        numberCell(low[step], width),
        numberCell(high[step], width),
      ]);
      return [textCell(facts.series), period, numberCell(point[step], width), ...bounds].join(",");
    }),
  );
  return [header.join(","), ...rows, ""].join("\n");
}
