import type { ObjectStore } from "../../lib/store/objectStore.ts";

const decoder = new TextDecoder();
const encoder = new TextEncoder();

/** Everything in a store, as text by key. */
export async function storeTexts(store: ObjectStore): Promise<Record<string, string>> {
  const texts: Record<string, string> = {};
  for (const { key } of await store.list("")) {
    const found = await store.read(key);
    texts[key] = decoder.decode(found?.bytes);
  }
  return texts;
}

/** Weekly, daily and monthly tables from a simple seeded recursion, enough for a run in a few seconds. */
export function smallTables(): Record<string, string> {
  const path = (count: number, coefficient: number, level: number) => {
    let state = 12345 + count;
    let deviation = 0;
    return Array.from({ length: count }, () => {
      state = (Math.imul(state, 1664525) + 1013904223) >>> 0; // Numerical Recipes' linear congruential generator
      deviation = coefficient * deviation + 20 * (state / 2 ** 32 - 0.5);
      return (level + deviation).toFixed(1);
    });
  };
  const dates = (from: string, stepDays: number, count: number) =>
    Array.from({ length: count }, (_, index) =>
      new Date(Date.parse(`${from}T00:00:00Z`) + index * stepDays * 86_400_000).toISOString().slice(0, 10),
    );
  const rows = (...columns: readonly string[][]) =>
    columns[0].map((_, row) => columns.map((column) => column[row]).join(","));
  const months = Array.from(
    { length: 60 },
    (_, index) =>
      `${2021 + Math.floor((index + 10) / 12)}-${String(((index + 10) % 12) + 1).padStart(2, "0")}`,
  );
  return {
    "series/weekly.csv": [
      "week,East,West",
      ...rows(dates("2023-12-04", 7, 156), path(156, 0.5, 200), path(156, 0.8, 90)),
      "",
    ].join("\n"),
    "series/north/daily.csv": [
      "day,visits",
      ...rows(dates("2026-05-01", 1, 213), path(213, 0.3, 50)),
      "",
    ].join("\n"),
    "series/monthly.csv": ["month,members", ...rows(months, path(60, 0.6, 700)), ""].join("\n"),
  };
}

export async function fillStore(store: ObjectStore, texts: Record<string, string>): Promise<void> {
  for (const [key, text] of Object.entries(texts)) await store.write(key, encoder.encode(text));
}
