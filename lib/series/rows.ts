/** Receives what stands in a delimited text, line by line. `line` counts from 1 as an editor does. */
export interface RowHandler {
  row(cells: string[], line: number): void;
  comment(text: string, line: number): void;
}

export interface RowSplitter {
  push(text: string): void;
  /** Hands out what is left. The line of a quote that never closes is returned, and its row is not handed out. */
  end(): { readonly unclosedQuote?: number };
  /** The row that has begun and not ended yet. */
  pending(): { readonly line: number; readonly length: number };
}

const quoteCode = 34;
const hashCode = 35;
const returnCode = 13;
/** A row longer than this is a quote that was never closed. */
const longestRow = 8_000_000;

/**
 * Splits delimited text into rows of cells as RFC 4180 describes: a cell may stand in double quotes, and then hold
 * delimiters, line ends and doubled quotes. Lenient beyond it: blanks before an opening quote, and text after a
 * closing one, do no harm; a quote inside a bare cell is just a character. A line that begins with `#` is a comment.
 * Text may come in pieces of any size.
 */
export function createRowSplitter(delimiter: string, handler: RowHandler): RowSplitter {
  let rest = "";
  let line = 1;
  let unclosedQuote: number | undefined;
  // Of the whole buffer; then lines are asked. Kept outside of `take`, because V8 would move the search of a local
  // constant into the loop where it is used, and search the whole buffer again for every row.
  let hasQuotes = false;

  const take = (buffer: string, last: boolean): number => {
    let at = 0;
    hasQuotes = buffer.includes('"');
    while (at < buffer.length) {
      let end = buffer.indexOf("\n", at);
      if (end < 0) {
        if (!last) break;
        end = buffer.length;
      }
      const stop = end > at && buffer.charCodeAt(end - 1) === returnCode ? end - 1 : end;
      const text = buffer.slice(at, stop);
      if (text.charCodeAt(0) === hashCode) handler.comment(text, line);
      else if (!hasQuotes || !text.includes('"')) handler.row(bareCells(text, delimiter), line);
      else {
        const quoted = quotedRow(buffer, at, delimiter, last);
        if (quoted === undefined) {
          if (!last && buffer.length - at < longestRow) break;
          unclosedQuote = line;
          return buffer.length;
        }
        handler.row(quoted.cells, line);
        line += quoted.lines;
        at = quoted.next;
        continue;
      }
      line++;
      at = end + 1;
    }
    return at;
  };

  return {
    push(text) {
      if (unclosedQuote !== undefined) return;
      const buffer = rest === "" ? text : rest + text;
      rest = buffer.slice(take(buffer, false));
    },
    pending: () => ({ line, length: rest.length }),
    end() {
      if (unclosedQuote === undefined && rest !== "") take(rest, true);
      rest = "";
      return { unclosedQuote };
    },
  };
}

/** Cells of a line without quotes. Short lines are cut by hand, which is several times faster than `split`. */
function bareCells(text: string, delimiter: string): string[] {
  if (text.length > 200) return text.split(delimiter);
  const cells: string[] = [];
  let from = 0;
  for (let at = text.indexOf(delimiter); at >= 0; at = text.indexOf(delimiter, from)) {
    cells.push(text.slice(from, at));
    from = at + 1;
  }
  cells.push(text.slice(from));
  return cells;
}

interface QuotedRow {
  readonly cells: string[];
  /** Where the next row begins. */
  readonly next: number;
  readonly lines: number;
}

/** Reads one row that holds a quote somewhere; `undefined` when the text ends before the row does. */
function quotedRow(text: string, start: number, delimiter: string, last: boolean): QuotedRow | undefined {
  const cells: string[] = [];
  let at = start;
  let lines = 1;
  for (;;) {
    let first = at;
    while (text.charCodeAt(first) === 32) first++;
    const isQuoted = text.charCodeAt(first) === quoteCode;
    let cell = "";
    if (isQuoted) {
      let from = first + 1;
      let quote = text.indexOf('"', from);
      while (quote >= 0 && text.charCodeAt(quote + 1) === quoteCode) {
        cell += text.slice(from, quote + 1);
        from = quote + 2;
        quote = text.indexOf('"', from);
      }
      // A quote at the very end may be the first half of a doubled one.
      if (quote < 0 || (!last && quote + 1 === text.length)) return undefined;
      cell += text.slice(from, quote);
      at = quote + 1;
      for (let end = cell.indexOf("\n"); end >= 0; end = cell.indexOf("\n", end + 1)) lines++;
    }
    let stop = at;
    while (stop < text.length && text[stop] !== delimiter && text[stop] !== "\n") stop++;
    if (stop === text.length && !last) return undefined;
    const ends = text[stop] !== delimiter;
    const bare = text.slice(
      at,
      ends && stop > at && text.charCodeAt(stop - 1) === returnCode ? stop - 1 : stop,
    );
    cells.push(isQuoted ? cell + bare.trimEnd() : bare);
    at = stop + 1;
    if (ends) return { cells, next: at, lines };
  }
}
