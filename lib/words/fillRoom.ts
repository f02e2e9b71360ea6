import { wrapLine } from "./lineWidth.ts";
import { type RankedLine, rank } from "./seriesLines.ts";

/** The lines of one series, what it is called at the start of each, and whether it has news. */
export interface SeriesLines {
  readonly label: string;
  readonly news: boolean;
  readonly lines: readonly RankedLine[];
}

/** A steady series' own line gives way to what changed elsewhere and what that means, but to nothing less. */
const steadyRank = rank.meaning + 0.5;

/**
 * Chooses the lines that fit into `room`, by rank over all series and then in their order, and returns them in
 * reading order with the number of series told. A series is told once its first line, what to expect, is taken;
 * series are taken from the front without leaving one out.
 */
export function fillRoom(series: readonly SeriesLines[], room: number): { lines: string[]; told: number } {
  const all = series.flatMap(({ label, news, lines }, index) =>
    lines.map((line, place) => ({
      index,
      place,
      order: news ? line.rank : line.rank === rank.next ? steadyRank : line.rank + 10,
      texts: wrapLine(line.text, `${label}: … `),
    })),
  );
  const byNeed = [...all].sort((one, other) => one.order - other.order || one.index - other.index);
  const taken = new Set<(typeof all)[number]>();
  let left = room;
  let told = 0;
  for (const line of byNeed) {
    const first = line.place === 0;
    if (line.texts.length > left || (first ? line.index !== told : line.index >= told)) continue;
    taken.add(line);
    left -= line.texts.length;
    if (first) told++;
  }
  return { lines: all.filter((line) => taken.has(line)).flatMap((line) => line.texts), told };
}
