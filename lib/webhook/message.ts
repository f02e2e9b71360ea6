/** The four shapes a body may take; chosen in settings, never guessed from the address. */
export type BodyShape = "text" | "content" | "card" | "json";

/**
 * A note ready for any body shape. Lines are plain text; each body escapes them for its own syntax
 * and drops whole lines from the end when its budget is spent. `data` is what the `json` body carries.
 */
export interface Message {
  readonly title: string;
  readonly lines: readonly string[];
  readonly footer: string;
  readonly data: unknown;
}
