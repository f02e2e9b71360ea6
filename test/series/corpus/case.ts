import type { TableSettings } from "../../../lib/series/tableSettings.ts";

/** One small ugly table, and what must come of it. */
export interface CorpusCase {
  /** A claim, completing "readTable …". */
  readonly claim: string;
  readonly input: string | Uint8Array;
  readonly settings?: TableSettings;
  readonly asOf?: string;
  readonly timeZone?: string;
  readonly locale?: string;
  /** Each series as `period start: values`, gaps as `_`. */
  readonly series?: Record<string, string>;
  /** Each problem as `code`, `code line 3` or `code line 3 column`, with `!` when nothing could be read. */
  readonly problems?: readonly string[];
  /** Words the first problem's remedy must hold. */
  readonly remedy?: string;
}

/** Bytes of a text in UTF-16, with or without a byte order mark. */
export function utf16(text: string, order: "le" | "be", mark: boolean): Uint8Array {
  const bytes = Buffer.from((mark ? "\uFEFF" : "") + text, "utf16le");
  return new Uint8Array(order === "be" ? bytes.swap16() : bytes);
}

export const latin = (text: string) => new Uint8Array(Buffer.from(text, "latin1"));
