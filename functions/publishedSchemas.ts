import * as z from "zod/mini";
import { modelDocumentSchema, summarySchema } from "../lib/job/documentSchemas.ts";
import { settingsSchema } from "../lib/job/settings.ts";

/** The text of each published JSON Schema (draft 2020-12) by file name: what an editor
 * completes settings from, and what programs that read our documents can rely on. */
export function publishedSchemas(): Record<string, string> {
  const settings = {
    title: "ebbwire settings",
    description: "settings.json of an ebbwire store. Every key may be left out.",
    ...z.toJSONSchema(settingsSchema, { io: "input" }),
  };
  const model = {
    title: "ebbwire model document",
    description:
      "models/<table>/<asOf>.json, compressed (.json.gz) from the second run of a table of 50 series or more: everything known of each series of a table after one run.",
    ...z.toJSONSchema(modelDocumentSchema),
  };
  const summary = {
    title: "ebbwire run summary",
    description: "runs/<asOf>/summary.json: what one run did.",
    ...z.toJSONSchema(summarySchema),
  };
  return {
    "settings.schema.json": formatted(settings),
    "model.schema.json": formatted(model),
    "summary.schema.json": formatted(summary),
  };
}

const formatted = (value: unknown) => `${JSON.stringify(value, null, 2)}\n`;
