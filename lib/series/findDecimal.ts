import type { Row } from "./layout.ts";
import { decimalEvidence, isMissing, type NumberStyle } from "./numbers.ts";
import { type Complain, quoted } from "./problems.ts";
import type { Reading } from "./reading.ts";
import { TableFault } from "./tableFault.ts";
import type { TableSettings } from "./tableSettings.ts";

/** So many rows are searched for contradictions; later ones only while nothing has told the mark. */
const fewRows = 3000;

interface Found {
  readonly mark: NumberStyle["decimal"];
  readonly how: Reading["decimal"]["how"];
}

/**
 * The decimal mark of a table from all of its number cells. `12.5` or `1,234.5` show a point, `12,5` or `1.234,5` a
 * comma. Cells such as `1.234` may be either: whole numbers below a thousand beside them show thousands; a point in
 * a table that is not separated by semicolons is a decimal point; else the settings are asked.
 *
 * @throws TableFault when cells contradict each other, or nothing tells
 */
export function findDecimal(
  rows: readonly Row[],
  columns: readonly number[],
  names: readonly string[],
  delimiter: string,
  settings: TableSettings,
  complain: Complain,
): Found {
  if (settings.decimal !== undefined) return { mark: settings.decimal, how: "set" };
  const seen = new Map<string, { line: number; column: number; cell: string }>();
  let small = 0;
  for (const [at, { line, cells }] of rows.entries()) {
    if (at >= fewRows && (seen.has(".") || seen.has(","))) break;
    for (const column of columns) {
      const cell = cells[column];
      if (cell === undefined || /^-?\d*$/.test(cell)) {
        if (cell !== undefined && cell !== "" && Math.abs(Number(cell)) < 1000) small++;
        continue;
      }
      if (isMissing(cell)) continue;
      const evidence = decimalEvidence(cell);
      if (!seen.has(evidence)) seen.set(evidence, { line, column, cell });
    }
  }
  const point = seen.get(".");
  const comma = seen.get(",");
  if (point && comma) {
    const [first, second] = point.line <= comma.line ? [point, comma] : [comma, point];
    throw new TableFault(
      complain(
        "mixed-decimals",
        true,
        `${quoted(first.cell)} in line ${first.line} and ${quoted(second.cell)} cannot both be right: one has a decimal point, the other a decimal comma`,
        'write all numbers one way, or say which is meant with "decimal" in the settings',
        { line: second.line, column: names[second.column] },
      ),
    );
  }
  if (point) return { mark: ".", how: "found" };
  if (comma) return { mark: ",", how: "found" };
  const maybePoint = seen.get("maybe-.");
  const maybeComma = seen.get("maybe-,");
  if (!maybePoint && !maybeComma) return { mark: ".", how: "usual" };
  if (small > 0) return { mark: maybePoint ? "," : ".", how: "found" };
  if (maybePoint && delimiter !== ";") return { mark: ".", how: "usual" };
  const doubtful = maybePoint ?? maybeComma;
  if (!doubtful) return { mark: ".", how: "usual" };
  throw new TableFault(
    complain(
      "decimal-unclear",
      true,
      `${quoted(doubtful.cell)} may be meant with thousands or with decimals, and no other number tells which`,
      'say "decimal": "." or "decimal": "," in the settings of this table',
      { line: doubtful.line, column: names[doubtful.column] },
    ),
  );
}
