import { nearestName } from "./nearestName.ts";
import { type Complain, quoted } from "./problems.ts";
import { TableFault } from "./tableFault.ts";

/** A cell of the header as the name of a column or series: on one line, without control characters. */
export const cleanName = (cell: string) => cell.replace(/[\p{Cc}\p{Cf}\s]+/gu, " ").trim();

/** Names of the columns, each only once: a nameless column is `column 3`, a repeated name gets ` (2)`. */
export function columnNames(header: readonly string[]): string[] {
  const seen = new Map<string, number>();
  return header.map((cell, at) => {
    const base = cleanName(cell) || `column ${at + 1}`;
    const count = (seen.get(base) ?? 0) + 1;
    seen.set(base, count);
    return count === 1 ? base : `${base} (${count})`;
  });
}

/**
 * The column a setting names; case does not matter when no column has the very name.
 *
 * @throws TableFault with the nearest name when there is none
 */
export function columnNamed(
  name: string,
  names: readonly string[],
  setting: string,
  complain: Complain,
): number {
  const wanted = cleanName(name);
  const exact = names.indexOf(wanted);
  if (exact >= 0) return exact;
  const folded = names.findIndex((one) => one.toLowerCase() === wanted.toLowerCase());
  if (folded >= 0) return folded;
  const near = nearestName(wanted, names);
  const known = names.length <= 12 ? names.join(", ") : `${names.slice(0, 11).join(", ")}, …`;
  throw new TableFault(
    complain(
      "no-such-column",
      true,
      `the settings name ${quoted(name)} under ${setting}, but the table has no such column`,
      near ? `did you mean ${quoted(near)}? The columns are ${known}` : `use one of the columns: ${known}`,
      { column: name },
    ),
  );
}

const dateWords =
  /(?:^|[\s_.-])(?:dates?|days?|weeks?|months?|quarters?|years?|periods?|time(?:stamps?)?|datetime|hours?|ts|epoch|datum|tag|woche|kw|monat|quartal|jahr|zeit(?:punkt)?|fecha|d[ií]a|semana|mes|a[nñ]o|data|jour|mois|ann[eé]e|semaine|giorno|mese|anno|dato|dag|maand|jaar|m[aå]ned|[aå]r)(?:$|[\s_.-])/i;

/** The name speaks of dates, in one of the larger European languages. */
export const speaksOfDates = (name: string) =>
  dateWords.test(name) || /(?:date|time|datum|zeit)$/i.test(name);

/** The name says that its dates are the last days of their periods: "week ending". */
export const speaksOfEnds = (name: string) => /\b(?:ending|ended|ends?)\b/i.test(name.replaceAll("_", " "));
