import { numberFormat } from "./formats.ts";
import { numberWriter, significantStep } from "./numbers.ts";

/** Numbers for analysts. */
export interface Statistics {
  /** To three significant digits: sizes, levels, statistics. */
  readonly size: (value: number) => string;
  /** To three decimals: coefficients and their errors. */
  readonly coefficient: (value: number | null) => string;
  /** The same with its sign always written. */
  readonly signed: (value: number | null) => string;
  readonly pValue: (value: number) => string;
}

/** Writers of statistics in a locale; `null` is told as "–". */
export function statisticsWriter(locale: string): Statistics {
  const write = numberWriter(locale);
  const options = { minimumFractionDigits: 3, maximumFractionDigits: 3 };
  const plain = numberFormat(locale, options);
  const withSign = numberFormat(locale, { ...options, signDisplay: "exceptZero" });
  const noMinusZero = (value: number) => (Math.abs(value) < 0.0005 ? 0 : value);
  return {
    size: (value) => write(value, significantStep(value, 3, false)),
    coefficient: (value) => (value === null ? "–" : plain.format(noMinusZero(value))),
    signed: (value) => (value === null ? "–" : withSign.format(noMinusZero(value))),
    pValue: (value) => (value < 0.001 ? `p < ${plain.format(0.001)}` : `p = ${plain.format(value)}`),
  };
}
