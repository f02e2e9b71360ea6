/** Where each value of a JSON text stands: line (from 1) by path, the parts of a path joined by `\u0000`. */
export type JsonLines = ReadonlyMap<string, number>;

export const pathKey = (path: readonly PropertyKey[]) => path.map(String).join("\u0000");

/**
 * Finds the line of every key and list entry of a JSON text that is known to parse, so that a problem can say where to
 * look. A key's line is that of the key itself; a repeated key has the line of its last mention, as its value does.
 */
export function jsonLines(text: string): JsonLines {
  const lines = new Map<string, number>();
  const tokens = /"(?:[^"\\]|\\.)*"|[{}[\],:]|[^\s{}[\],:"]+|\n/g;
  /** One entry an open list or object: the key (or index) of what comes next. */
  const open: { isList: boolean; key: string | number; awaitsKey: boolean }[] = [];
  let line = 1;
  const here = () => pathKey(open.map(({ key }) => key));
  for (const [token] of text.matchAll(tokens)) {
    const top = open.at(-1);
    if (token === "\n") line++;
    else if (token === "," && top) {
      if (top.isList) top.key = Number(top.key) + 1;
      else top.awaitsKey = true;
    } else if (token === "}" || token === "]") open.pop();
    else if (token !== ":") {
      if (top && !top.isList && top.awaitsKey) {
        top.key = JSON.parse(token);
        top.awaitsKey = false;
        lines.set(here(), line);
        continue;
      }
      if (top?.isList) lines.set(here(), line);
      if (token === "{") open.push({ isList: false, key: "", awaitsKey: true });
      else if (token === "[") open.push({ isList: true, key: 0, awaitsKey: false });
    }
  }
  return lines;
}
