import { seeded } from "./faultProxy.ts";

/**
 * Three weekly tables of one short series each: the least that takes a run through all its steps, so that hundreds of
 * runs take little time. The last period ends before 2026-11-30.
 */
export function tinyTables(): Record<string, string> {
  return Object.fromEntries(
    ["lanes", "north/desk", "quay"].map((table, index) => {
      const next = seeded(index + 1);
      const rows = Array.from({ length: 24 }, (_, week) => {
        const date = new Date(Date.UTC(2026, 5, 15 + 7 * week)).toISOString().slice(0, 10);
        return `${date},${(100 + 40 * index + 30 * next()).toFixed(1)}`;
      });
      return [`series/${table}.csv`, `${["week,visits", ...rows].join("\n")}\n`];
    }),
  );
}

/** The instant at which the tables' last week is complete. */
export const tinyAsOf = "2026-11-30T06:00:00Z";
