import { numberFormat } from "./formats.ts";

/** Writes a number so that its last digit is the place of `step`. */
export type WriteNumber = (value: number, step: number) => string;

/**
 * The step that a number known only to within a range of width `spread` is rounded to: the largest 1 or 5 times a
 * power of ten within a tenth of the width, so that rounding moves nothing by more than a twentieth of its range.
 * Whole-number data never get a step below one.
 *
 * @example roundingStep(85, true) // 5
 * @example roundingStep(28, true) // 1
 */
export function roundingStep(spread: number, whole: boolean): number {
  if (!Number.isFinite(spread) || spread <= 0) return whole ? 1 : 1e-3;
  const power = powerBelow(spread / 10);
  const step = spread / 10 >= 5 * power ? 5 * power : power;
  return whole ? Math.max(1, step) : step;
}

/** The step that keeps `digits` significant digits of `value`. */
export function significantStep(value: number, digits: number, whole: boolean): number {
  const size = Math.abs(value);
  const step = Number.isFinite(size) && size > 0 ? powerBelow(size) / 10 ** (digits - 1) : 1;
  return whole ? Math.max(1, step) : step;
}

/** The largest power of ten not above `size`; nudged so that 1000 itself is not missed by a rounding of log10. */
function powerBelow(size: number): number {
  return 10 ** Math.floor(Math.log10(size) + 1e-12);
}

/** Rounds to a multiple of a step (1 or 5 times a power of ten), without the noise of binary fractions and without minus zero. */
export function roundTo(value: number, step: number): number {
  if (!Number.isFinite(value)) return value;
  const rounded =
    step >= 1
      ? Math.round(value / step) * step
      : Math.round(value * Math.round(1 / step)) / Math.round(1 / step);
  return rounded === 0 ? 0 : rounded;
}

/** Numbers as a locale writes them; beyond a thousand million in words, the very smallest by significant digits. */
export function numberWriter(locale: string): WriteNumber {
  return (value, step) => {
    const rounded = roundTo(value, step);
    if (!Number.isFinite(rounded)) return "unknown";
    if (Math.abs(rounded) >= 1e9)
      return numberFormat(locale, {
        notation: "compact",
        compactDisplay: "long",
        maximumSignificantDigits: 3,
      }).format(rounded);
    if (step < 1e-12 && rounded !== 0)
      return numberFormat(locale, { notation: "scientific", maximumSignificantDigits: 3 }).format(rounded);
    const digits = step < 1e-12 ? 0 : Math.max(0, Math.ceil(-Math.log10(step) - 1e-9));
    return numberFormat(locale, { minimumFractionDigits: digits, maximumFractionDigits: digits }).format(
      rounded,
    );
  };
}

/** Every value that is there is a whole number. */
export function allWhole(values: readonly (number | null)[]): boolean {
  return values.every((value) => value === null || Number.isInteger(value));
}
