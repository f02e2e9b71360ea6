/** What one audience is told of a run: plain text lines, and the same facts as data for receivers that are programs. */
export interface Note {
  readonly title: string;
  readonly lines: readonly string[];
  readonly footer: string;
  readonly data: unknown;
}

/** Stands under every note. */
export const caution =
  "Statistical estimates: they can be wrong. Decisions where safety or much money hangs on them need a qualified person's judgement.";
