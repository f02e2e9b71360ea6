/** What one audience is told of a run: plain text lines, and the same facts as data for receivers that are programs. */
export interface Note {
  readonly title: string;
  readonly lines: readonly string[];
  readonly footer: string;
  readonly data: unknown;
}

/** Under everything that is said in words. */
export const caution =
  "Statistical estimates: they can be wrong. Decisions where safety or much money hangs on them need a qualified person's judgement.";

/**
 * Stands under every note, once: the caution, and where the report is. Ours alone, without any name from outside, so
 * that receivers may leave its link whole where they break links in lines.
 */
export function footerOf(reportPlace: string): string {
  return `${caution} Why, with pictures: ${reportPlace}`;
}
