import * as z from "zod/mini";
import { settingsSchema } from "../lib/job/settings.ts";

/** The text of each published JSON Schema (draft 2020-12) by file name: what an editor completes settings from. */
export function publishedSchemas(): Record<string, string> {
  const settings = {
    title: "ebbwire settings",
    description: "settings.json of an ebbwire store. Every key may be left out.",
    ...z.toJSONSchema(settingsSchema, { io: "input" }),
  };
  return { "settings.schema.json": formatted(settings) };
}

/** Short lists on one line, as the formatter of this repository writes them. */
function formatted(value: unknown): string {
  const text = JSON.stringify(value, null, 2).replace(/\[\n\s+([^[\]{}]*?)\n\s+\]/g, (_, entries: string) => {
    const inline = entries.replace(/\n\s+/g, " ");
    return `[${inline}]`;
  });
  return `${text}\n`;
}
