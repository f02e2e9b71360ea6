/** Columns padded to one width, right-aligned after the first, two spaces apart; for terminals and fixed-width chat. */
export function textTable(rows: readonly (readonly string[])[]): string[] {
  const widths = (rows[0] ?? []).map((_, column) => Math.max(...rows.map((row) => [...row[column]].length)));
  return rows.map((row) =>
    row
      .map((cell, column) => {
        const space = " ".repeat(widths[column] - [...cell].length);
        return column === 0 ? cell + space : space + cell;
      })
      .join("  ")
      .trimEnd(),
  );
}
