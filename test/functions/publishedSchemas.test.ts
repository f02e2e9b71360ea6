import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { publishedSchemas } from "../../functions/publishedSchemas.ts";
import { settingsSchema } from "../../lib/job/settings.ts";
import { tableSettingsSchema } from "../../lib/series/tableSettings.ts";

interface Schema {
  readonly description?: string;
  readonly properties?: Record<string, Schema>;
  readonly additionalProperties?: Schema | boolean;
  readonly items?: Schema;
}

const published = publishedSchemas();
const settings = JSON.parse(published["settings.schema.json"]) as Schema;

describe("published schemas", () => {
  it("stand in events/schemas/ as `npm run schemas` writes them", () => {
    for (const [name, text] of Object.entries(published))
      expect(readFileSync(`events/schemas/${name}`, "utf8")).toBe(text);
  });

  it("describe every setting, so that an editor can explain it", () => {
    const bare: string[] = [];
    const walk = (schema: Schema, path: string) => {
      for (const [key, inner] of Object.entries(schema.properties ?? {})) {
        if (!inner.description) bare.push(`${path}.${key}`);
        walk(inner, `${path}.${key}`);
      }
      if (schema.items) walk(schema.items, `${path}[]`);
      if (typeof schema.additionalProperties === "object") walk(schema.additionalProperties, `${path}.*`);
    };
    walk(settings, "settings");
    expect(bare).toEqual([]);
  });

  it("know the same keys as the settings reader, and refuse others", () => {
    expect(Object.keys(settings.properties ?? {})).toEqual(Object.keys(settingsSchema.shape));
    expect(settings.additionalProperties).toBe(false);
    const table = settings.properties?.tables.additionalProperties as Schema;
    expect(Object.keys(table.properties ?? {})).toEqual(Object.keys(tableSettingsSchema.shape));
    expect(table.additionalProperties).toBe(false);
  });
});
