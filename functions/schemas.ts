import { mkdir, writeFile } from "node:fs/promises";
import { publishedSchemas } from "./publishedSchemas.ts";

// `npm run schemas`: writes the JSON Schemas of what people write and what programs read into events/schemas.
await mkdir("events/schemas", { recursive: true });
for (const [name, text] of Object.entries(publishedSchemas())) {
  await writeFile(`events/schemas/${name}`, text);
  process.stdout.write(`events/schemas/${name}\n`);
}
