import { writeFileSync } from "node:fs";
import { demoTables } from "./makeDemo.ts";

// Run from the top of the project: writes the demo tables that are kept in the repository.
for (const [name, text] of Object.entries(demoTables())) writeFileSync(`events/demo/series/${name}`, text);
