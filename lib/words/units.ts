/**
 * The unit as it follows a number. A plural English unit loses its ending after exactly one; short units such as
 * "kg" or "gas" are left alone.
 *
 * @example unitAfter("loans", 1) // "loan"
 */
export function unitAfter(unit: string | null, value: number): string {
  if (unit === null) return "";
  if (value !== 1 || unit.length < 4 || !/[a-z]s$/.test(unit) || /(ss|us|is)$/.test(unit)) return unit;
  if (/ies$/.test(unit)) return `${unit.slice(0, -3)}y`;
  if (/(x|ch|sh|ss|z)es$/.test(unit)) return unit.slice(0, -2);
  return unit.slice(0, -1);
}
