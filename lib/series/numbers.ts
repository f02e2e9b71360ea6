/** How a table writes its numbers. */
export interface NumberStyle {
  readonly decimal: "." | ",";
}

const missingMarks = new Set(
  (
    "na|n/a|#n/a|#na|nan|null|none|nil|-|--|---|–|—|.|..|...|?|*|missing|k.a.|n.v.|n.d.|s/d|" +
    "#value!|#div/0!|#ref!|#num!|#name?|#null!|\\n"
  ).split("|"),
);

/** The cell says that there is no value: empty, `NA`, `-`, `null`, a spreadsheet's error and the like. */
export function isMissing(cell: string): boolean {
  const text = cell.trim();
  return text === "" || (text.length <= 8 && missingMarks.has(text.toLowerCase()));
}

const zeroCode = 48;
const powersOfTen = Array.from({ length: 23 }, (_, power) => 10 ** power);

/**
 * A number of digits with at most one decimal mark, or `NaN` for anything else. Exact: up to 15 digits the quotient
 * of two exact numbers is the nearest double, as `Number` would give.
 */
function plainNumber(text: string, decimalCode: number): number {
  let at = 0;
  const negative = text.charCodeAt(0) === 45;
  if (negative) at++;
  let mantissa = 0;
  let digits = 0;
  let pointAt = -1;
  for (; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code >= zeroCode && code <= zeroCode + 9) {
      mantissa = mantissa * 10 + (code - zeroCode);
      digits++;
    } else if (code === decimalCode && pointAt < 0) pointAt = digits;
    else return Number.NaN;
  }
  if (digits === 0 || digits > 15) return Number.NaN;
  const value = pointAt < 0 ? mantissa : mantissa / powersOfTen[digits - pointAt];
  return negative ? -value : value;
}

const blanks = /[\s\u00a0\u2007\u2009\u202f]/g;
const currency =
  /^(?:[A-Z]{1,3}\$|[\p{Sc}]|[A-Z]{3}|kr\.?|zł|Kč|Ft|lei|Fr\.?)|(?:[\p{Sc}]|[A-Z]{3}|kr\.?|zł|Kč|Ft|lei|Fr\.?)$/u;

/** A number cell without its ornaments: sign, and digits with their marks. `undefined` when it is no number. */
export interface BareNumber {
  readonly negative: boolean;
  /** Digits, dots and commas; blanks and apostrophes between thousands are gone. */
  readonly digits: string;
  /** Power of ten of scientific notation. */
  readonly exponent: string;
  readonly percent: boolean;
}

/** Takes sign, currency, percent sign, parentheses, blanks and apostrophes off a cell. */
export function bareNumber(cell: string): BareNumber | undefined {
  let text = cell.replace(/[\u2212\u2013\u2012]/g, "-").trim();
  let negative = false;
  const isNegative = () => {
    const had = text.startsWith("-");
    if (had || text.startsWith("+")) text = text.slice(1).trimStart();
    if (had) negative = !negative;
    return had;
  };
  if (text.startsWith("(") && text.endsWith(")")) {
    negative = true;
    text = text.slice(1, -1).trim();
  }
  isNegative();
  const withoutCurrency = text.replace(currency, "").trim();
  if (withoutCurrency !== text) {
    text = withoutCurrency;
    isNegative();
  }
  const percent = text.endsWith("%") || text.endsWith("‰");
  if (percent) text = text.slice(0, -1).trimEnd();
  if (text.endsWith("-") && !negative) {
    negative = true;
    text = text.slice(0, -1).trimEnd();
  }
  const match = /^([\d.,'’\s\u00a0\u2007\u2009\u202f]*\d[.,]?)(?:[eE]([+-]?\d{1,3}))?$/.exec(text);
  if (!match) return undefined;
  let digits = match[1];
  if (/[\s\u00a0\u2007\u2009\u202f'’]/.test(digits)) {
    // Blanks and apostrophes may only stand between groups of three.
    if (!/^\d{1,3}(?:[\s\u00a0\u2007\u2009\u202f'’]\d{3})+(?:[.,]\d*)?$/.test(digits)) return undefined;
    digits = digits.replace(blanks, "").replace(/['’]/g, "");
  }
  return { negative, digits, exponent: match[2] ?? "0", percent };
}

/**
 * The number a cell stands for, or `NaN` when it is none under this style. `1.234` with a decimal comma is one
 * thousand two hundred and thirty-four; `1.23` is then no number at all rather than another one.
 */
export function parseNumber(cell: string, style: NumberStyle): number {
  const quick = plainNumber(cell, style.decimal === "." ? 46 : 44);
  if (!Number.isNaN(quick)) return quick;
  const bare = bareNumber(cell);
  if (!bare) return Number.NaN;
  const parts = bare.digits.split(style.decimal);
  if (parts.length > 2) return Number.NaN;
  const whole = parts[0];
  const grouped =
    style.decimal === "." ? /^\d{1,3}(?:,\d{3})+$|^\d{1,2}(?:,\d{2})+,\d{3}$/ : /^\d{1,3}(?:\.\d{3})+$/;
  const fraction = parts[1] ?? "";
  if (!/^\d*$/.test(whole) && !grouped.test(whole)) return Number.NaN;
  if (!/^\d*$/.test(fraction) || whole + fraction === "") return Number.NaN;
  const value = Number(`${whole.replace(/[.,]/g, "") || "0"}.${fraction || "0"}e${bare.exponent}`);
  if (!Number.isFinite(value)) return Number.NaN;
  return bare.negative ? -value : value;
}

/** What one cell says about the decimal mark of its table. */
export type DecimalEvidence = "." | "," | "maybe-." | "maybe-," | "whole" | "none";

/**
 * What a number cell tells: `1.5` and `1,234.5` say point, `1,5` and `1.234,5` comma; `1.234` may be either (named
 * for the mark it holds); a whole number without marks is `whole`.
 */
export function decimalEvidence(cell: string): DecimalEvidence {
  if (/^-?\d+$/.test(cell)) return "whole";
  const digits = bareNumber(cell)?.digits;
  if (digits === undefined) return "none";
  const dots = digits.split(".").length - 1;
  const commas = digits.split(",").length - 1;
  if (dots === 0 && commas === 0) return "whole";
  if (dots > 0 && commas > 0) {
    const mark = digits.lastIndexOf(".") > digits.lastIndexOf(",") ? "." : ",";
    return Number.isNaN(parseNumber(cell, { decimal: mark })) ? "none" : mark;
  }
  const mark = dots > 0 ? "." : ",";
  const other = dots > 0 ? "," : ".";
  if (dots + commas > 1) return Number.isNaN(parseNumber(cell, { decimal: other })) ? "none" : other;
  return /^[1-9]\d{0,2}[.,]\d{3}$/.test(digits) ? `maybe-${mark}` : mark;
}
