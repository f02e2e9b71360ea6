import type { Message } from "./message.ts";
import { steering } from "./plainText.ts";

const budgetBytes = 20_000;
const longestString = 300;

/**
 * The `json` body: the message's `data`, for programs. Names stay exactly as they are. Where it would pass 20 kB,
 * long strings are shortened first; then the longest lists lose entries from their ends, and a member `omitted`
 * says how many from which list (`{ "series": 120 }`).
 */
export function jsonBody(message: Message): string {
  const whole = serialise(message.data);
  if (size(whole) <= budgetBytes) return whole;
  const data = shortened(JSON.parse(whole) as unknown);
  const omitted: Record<string, number> = {};
  for (;;) {
    const body = serialise(Object.keys(omitted).length === 0 ? data : { ...asObject(data), omitted });
    if (size(body) < budgetBytes) return body;
    const list = largestList(data, "");
    if (list === undefined) return serialise({ title: shortened(message.title), omitted: { all: 1 } });
    const left = Math.floor(list.entries.length / 2);
    omitted[list.path] = (omitted[list.path] ?? 0) + list.entries.length - left;
    list.entries.length = left;
  }
}

interface Found {
  readonly path: string;
  readonly entries: unknown[];
  readonly bytes: number;
}

/** The list that takes the most bytes by itself, its inner lists left out of the comparison when one entry long. */
function largestList(value: unknown, path: string): Found | undefined {
  if (typeof value !== "object" || value === null) return undefined;
  let best: Found | undefined;
  if (Array.isArray(value) && value.length > 0) {
    best = { path: path || "list", entries: value, bytes: size(serialise(value)) };
  }
  for (const [name, inner] of Object.entries(value)) {
    const found = largestList(inner, path === "" ? name : `${path}.${name}`);
    // An inner list is cut before the outer one when it makes up most of it.
    if (found !== undefined && (best === undefined || found.bytes * 2 > best.bytes)) best = found;
  }
  return best;
}

function shortened(value: unknown): unknown {
  if (typeof value === "string") {
    return value.length <= longestString ? value : `${value.slice(0, longestString - 1)}…`;
  }
  if (Array.isArray(value)) return value.map(shortened);
  if (typeof value !== "object" || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([name, inner]) => [name, shortened(inner)]));
}

function asObject(data: unknown): object {
  return Array.isArray(data) ? { list: data } : (data as object);
}

/**
 * JSON in which markup signs and steering characters stand as escapes, where they mean the same: nothing then reads
 * them as markup or turns the text around.
 */
function serialise(value: unknown): string {
  const escaped = (text: string) =>
    Array.from(
      { length: text.length },
      (_, i) => `\\u${text.charCodeAt(i).toString(16).padStart(4, "0")}`,
    ).join("");
  return (JSON.stringify(value) ?? "null").replace(/[<>&\u2028\u2029]/g, escaped).replace(steering, escaped);
}

function size(text: string): number {
  return Buffer.byteLength(text);
}
