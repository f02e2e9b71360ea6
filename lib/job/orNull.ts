/** JSON has no infinity: what is not finite is `null` in documents. */
export const orNull = (value: number): number | null => (Number.isFinite(value) ? value : null);
