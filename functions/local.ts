import { runCommand } from "./commands.ts";

process.exitCode = await runCommand(process.argv.slice(2));
