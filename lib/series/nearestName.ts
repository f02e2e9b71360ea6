/** Levenshtein's distance between two words. */
function distance(one: string, other: string): number {
  let row = Array.from({ length: other.length + 1 }, (_, at) => at);
  for (let i = 1; i <= one.length; i++) {
    const next = [i];
    for (let j = 1; j <= other.length; j++)
      next.push(Math.min(row[j] + 1, next[j - 1] + 1, row[j - 1] + (one[i - 1] === other[j - 1] ? 0 : 1)));
    row = next;
  }
  return row[other.length];
}

/** The known name a mistyped one was probably meant to be, if any is near. */
export function nearestName(name: string, known: readonly string[]): string | undefined {
  const plain = (text: string) => text.toLowerCase().replace(/[\s_-]/g, "");
  const ranked = known
    .map((candidate) => ({ candidate, far: distance(plain(name), plain(candidate)) }))
    .sort((a, b) => a.far - b.far);
  const best = ranked[0];
  return best && best.far <= Math.max(1, Math.floor(name.length / 2)) ? best.candidate : undefined;
}
