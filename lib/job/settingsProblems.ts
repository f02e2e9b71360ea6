import type { core } from "zod/mini";
import type { Problem } from "../series/series.ts";

export const settingsProblems = {
  notJson(_text: string, error: Error): Problem {
    return {
      table: "settings.json",
      code: "settings-not-json",
      message: `settings.json is not JSON: ${error.message}`,
      remedy: "correct the place named",
      fatal: true,
    };
  },
  ofIssues(_text: string, _value: unknown, issues: readonly core.$ZodIssue[]): Problem[] {
    return issues.map((issue) => ({
      table: "settings.json",
      code: "settings-invalid",
      message: `settings.json: ${issue.path.join(".")}: ${issue.message}`,
      remedy: "correct it",
      fatal: true,
    }));
  },
};
