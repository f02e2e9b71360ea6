import type { ObjectStore } from "../store/objectStore.ts";
import type { RunFacts, TableFacts } from "../words/facts.ts";
import { readDocument, type Versioned } from "./documents.ts";
import { problemsKey } from "./keys.ts";
import { readModel } from "./modelDocument.ts";
import type { FailedTable, Plan } from "./summary.ts";
import { valuesInYear } from "./watchFacts.ts";

/** `runs/<asOf>/problems/<table>.json`: why a table could not be refitted in this run. */
export interface ProblemsDocument extends Versioned, FailedTable {}

/** What became of some tables of a plan. */
export interface Gathered {
  readonly tables: readonly TableFacts[];
  readonly failed: readonly FailedTable[];
  /** Neither refitted nor failed yet. */
  readonly left: readonly string[];
}

/** Reads back what the workers wrote for these tables. */
export async function gatherTables(
  store: ObjectStore,
  asOf: string,
  names: readonly string[],
): Promise<Gathered> {
  const tables: TableFacts[] = [];
  const failed: FailedTable[] = [];
  const left: string[] = [];
  for (const table of names) {
    const model = await readModel(store, table, asOf);
    if (model) {
      tables.push({ table, series: model.series.map((one) => one.facts), problems: model.problems });
      continue;
    }
    const problems = await readDocument<ProblemsDocument>(store, problemsKey(asOf, table));
    if (problems) failed.push({ table, problems: problems.problems });
    else left.push(table);
  }
  return { tables, failed, left };
}

/**
 * The facts of a whole run. `expectedFalseNotices` sums over all watched series what chance alone would bring in a year:
 * the false-alarm rate of a reference, as often as a year uses up its looks.
 */
export function runFacts(plan: Plan, gathered: Gathered, undelivered: RunFacts["undelivered"]): RunFacts {
  const watched = gathered.tables.flatMap((table) =>
    table.series.map(({ monitor, period }) =>
      monitor ? (monitor.falseAlarmRate * valuesInYear[period]) / monitor.looks : 0,
    ),
  );
  return {
    asOf: plan.asOf,
    tables: gathered.tables,
    failed: [...plan.refused, ...gathered.failed],
    left: gathered.left,
    expectedFalseNotices: watched.reduce((sum, rate) => sum + rate, 0),
    undelivered,
  };
}
