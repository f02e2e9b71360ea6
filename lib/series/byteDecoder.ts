import { type Encoding, findEncoding, foreignFile } from "./decode.ts";
import type { Complain } from "./problems.ts";
import { TableFault } from "./tableFault.ts";
import { windows1252 } from "./windows1252.ts";

/** Turns the bytes of a text, given in pieces, into text. */
export interface ByteDecoder {
  push(bytes: Uint8Array): string;
  end(): string;
  encoding(): Encoding;
}

type Decoder = InstanceType<typeof TextDecoder>;

/** Bytes looked at to tell the encoding. */
const headLength = 1 << 16;

/**
 * Finds the encoding from the first bytes and decodes. Bytes that turn out not to be UTF-8 later on, after nothing but
 * ASCII, are Windows-1252 from there; after real UTF-8 they become replacement characters.
 *
 * @throws TableFault for another kind of file
 */
export function createByteDecoder(set: Encoding | undefined, complain: Complain): ByteDecoder {
  let head: Uint8Array[] = [];
  let held = 0;
  let found: Encoding | undefined;
  let decoder: Decoder | undefined;
  let onlyAscii = true;

  const decode = (bytes: Uint8Array, last: boolean): string => {
    if (found === "windows-1252") return windows1252(bytes);
    try {
      const text = (decoder as Decoder).decode(bytes, { stream: !last });
      if (found === "utf-8" && onlyAscii && text.length !== bytes.length) onlyAscii = false;
      return text;
    } catch {
      if (onlyAscii) {
        found = "windows-1252";
        return windows1252(bytes);
      }
      decoder = new TextDecoder("utf-8");
      return decoder.decode(bytes, { stream: !last });
    }
  };
  const start = (last: boolean): string => {
    const bytes = head.length === 1 ? head[0] : concatenated(head, held);
    head = [];
    const foreign = foreignFile(bytes);
    if (foreign)
      throw new TableFault(
        complain("not-a-table", true, `the file is ${foreign}, not a table`, "save the table as CSV"),
      );
    found = set ?? findEncoding(bytes);
    // ASCII reads the same in Windows-1252, whose own decoder has no state and needs no object.
    decoder = new TextDecoder(found === "windows-1252" ? "utf-8" : found, {
      fatal: set === undefined && found === "utf-8",
    });
    return decode(bytes, last);
  };
  return {
    push(bytes) {
      if (decoder) return decode(bytes, false);
      head.push(bytes);
      held += bytes.length;
      return held >= headLength ? start(false) : "";
    },
    end() {
      const text = decoder ? decode(new Uint8Array(0), true) : start(true);
      return text.endsWith("\u001a") ? text.slice(0, -1) : text;
    },
    encoding: () => found ?? "utf-8",
  };
}

/** Pieces as one array. */
export function concatenated(pieces: readonly Uint8Array[], length: number): Uint8Array {
  const whole = new Uint8Array(length);
  let at = 0;
  for (const piece of pieces) {
    whole.set(piece, at);
    at += piece.length;
  }
  return whole;
}
