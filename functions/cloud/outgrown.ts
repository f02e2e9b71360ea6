/** What one function saw of its work so far. */
export interface Pace {
  readonly doneTables: number;
  readonly leftTables: number;
  readonly elapsedMilliseconds: number;
  readonly remainingMilliseconds: number;
}

/** Kept back for the messages, the report and the deliveries. */
const closingMilliseconds = 60_000;
/** Tables differ in size: the rest is taken to be this much slower than what was done. */
const caution = 1.25;

/**
 * Whether the rest of a run, at the pace seen so far, takes longer than one function has. Judged from measured
 * time and not from counts, because a table may hold one series or a thousand. With nothing done yet there
 * is no pace, and no ground to hand over.
 *
 * @example outgrown({ doneTables: 25, leftTables: 975, elapsedMilliseconds: 60_000, remainingMilliseconds: 840_000 }) // true
 */
export function outgrown({
  doneTables,
  leftTables,
  elapsedMilliseconds,
  remainingMilliseconds,
}: Pace): boolean {
  if (doneTables === 0 || leftTables === 0) return false;
  const needed = (elapsedMilliseconds / doneTables) * leftTables * caution;
  return needed > remainingMilliseconds - closingMilliseconds;
}
