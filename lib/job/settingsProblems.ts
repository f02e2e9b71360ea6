import type { core } from "zod/mini";
import { nearestName } from "../series/nearestName.ts";
import type { Problem } from "../series/series.ts";
import { jsonLines, pathKey } from "./jsonLines.ts";

const table = "settings.json";

/** A path as people write it: `tables.loans.every`, `webhooks[0].address`. */
function spoken(path: readonly PropertyKey[]): string {
  return path
    .map((part, at) =>
      typeof part === "number"
        ? `[${part + 1}]`
        : /^[\w$-]+$/.test(String(part))
          ? `${at === 0 ? "" : "."}${String(part)}`
          : `["${String(part)}"]`,
    )
    .join("");
}

function valueAt(value: unknown, path: readonly PropertyKey[]): unknown {
  return path.reduce<unknown>(
    (inner, part) =>
      typeof inner === "object" && inner !== null ? (inner as Record<PropertyKey, unknown>)[part] : undefined,
    value,
  );
}

/** A value as it may be shown. What may be a secret is not. */
function shown(value: unknown, path: readonly PropertyKey[]): string {
  const harmless = path.at(-1) === "audience" || path.at(-1) === "body";
  if (path[0] === "webhooks" && !harmless) return "what stands there";
  const text = JSON.stringify(value) ?? "nothing";
  return text.length > 40 ? `${text.slice(0, 39)}…` : text;
}

const kinds: Record<string, string> = {
  string: "a text in quotation marks",
  number: "a number",
  int: "a whole number",
  boolean: "true or false",
  array: "a list in [ ]",
  object: "a group in { }",
  record: "a group in { }",
};

/** What one finding of the schema asks for. */
function demand(issue: core.$ZodIssue): string {
  switch (issue.code) {
    case "invalid_type":
      return `must be ${kinds[issue.expected] ?? issue.expected}`;
    case "invalid_value":
      return `must be ${issue.values.length > 1 ? "one of " : ""}${issue.values.map((value) => (value === "\t" ? '"\\t" (tab)' : JSON.stringify(value))).join(", ")}`;
    case "too_small":
      return issue.origin === "string" || issue.origin === "array"
        ? "must not be empty"
        : `must be ${issue.inclusive ? `${issue.minimum} or more` : `more than ${issue.minimum}`}`;
    case "too_big":
      return `must be ${issue.inclusive ? `${issue.maximum} or less` : `less than ${issue.maximum}`}`;
    case "invalid_union":
      return "must be a name, or a list of names";
    default:
      return issue.message;
  }
}

/** The problems of settings whose JSON is right and whose content is not: all of them, in the order of the text. */
export function problemsOfIssues(
  text: string,
  value: unknown,
  issues: readonly core.$ZodIssue[],
  knownKeys: (path: readonly PropertyKey[]) => readonly string[],
): Problem[] {
  const lines = jsonLines(text);
  const lineOf = (path: readonly PropertyKey[]): number | undefined =>
    lines.get(pathKey(path)) ?? (path.length > 0 ? lineOf(path.slice(0, -1)) : undefined);
  const problems: Problem[] = [];
  const add = (path: readonly PropertyKey[], code: string, message: string, remedy: string) =>
    problems.push({
      table,
      line: lineOf(path),
      code,
      message: `settings.json: ${message}`,
      remedy,
      fatal: true,
    });
  for (const issue of issues) {
    if (issue.code === "unrecognized_keys") {
      for (const key of issue.keys) {
        const known = knownKeys(issue.path);
        const near = nearestName(key, known);
        const place = issue.path.length === 0 ? "" : ` under ${spoken(issue.path)}`;
        add(
          [...issue.path, key],
          "unknown-setting",
          `there is no setting "${key}"${place}`,
          near ? `did you mean "${near}"?` : `use one of: ${known.join(", ")}`,
        );
      }
      continue;
    }
    const present = valueAt(value, issue.path);
    const name = issue.path.length === 0 ? "the whole" : spoken(issue.path);
    if (present === undefined)
      add(issue.path, "missing-setting", `${name} is missing`, `add it: it ${demand(issue)}`);
    else
      add(
        issue.path,
        "bad-setting",
        `${name} ${demand(issue)}, and is ${shown(present, issue.path)}`,
        "correct it",
      );
  }
  return problems.sort((a, b) => (a.line ?? 0) - (b.line ?? 0));
}

/** The problem of a text that is no JSON, with the line the parser stopped at. */
export function problemOfSyntax(text: string, error: Error): Problem {
  const position = /position (\d+)/.exec(error.message)?.[1];
  const until = position === undefined ? text : text.slice(0, Number(position));
  const line = until.split("\n").length;
  // Never the engine's own words in full: they quote the text, and an address may stand in it.
  const reason = /^(Unexpected end|Unexpected token|Expected|Bad)/.exec(error.message)?.[0] ?? "unreadable";
  const comma = /,\s*[}\]]/.test(text) ? "take away the comma before the closing bracket" : undefined;
  return {
    table,
    line,
    code: "not-json",
    message: `settings.json: the text is not JSON (${reason})`,
    remedy: comma ?? "look for a missing comma or quotation mark at this line or just above",
    fatal: true,
  };
}
