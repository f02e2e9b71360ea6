import type { ObjectStore } from "../store/objectStore.ts";
import { attentionTo, newsFrom } from "../words/attention.ts";
import type { GoneTable, RunFacts, SeriesFacts, TableFacts } from "../words/facts.ts";
import { readDocument, type Versioned } from "./documents.ts";
import { problemsKey } from "./keys.ts";
import { hasForecast, modelReader } from "./modelDocument.ts";
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
  /** Series that stand in no table here, for want of room. */
  readonly untold: NonNullable<RunFacts["untold"]>;
  readonly expectedFalseNotices: number;
}

/** Series whose facts a run can hold at a time; a digest and a report of more would be read by nobody. */
const mostWithNews = 2_000;
const mostSteady = 1_000;

/** Keeps as many series as there is room for, those with news before the steady, and counts the rest. */
class Gathering {
  private readonly untold = { steady: 0, news: 0, watched: 0 };
  private expected = 0;
  private news = 0;
  private steady = 0;

  /** The facts of a table that there is room for. */
  take(series: readonly SeriesFacts[]): SeriesFacts[] {
    return series.filter((facts) => {
      const { monitor, period } = facts;
      if (monitor) this.expected += (monitor.falseAlarmRate * valuesInYear[period]) / monitor.looks;
      const hasNews = attentionTo(facts) >= newsFrom;
      const fits = hasNews ? this.news++ < mostWithNews : this.steady++ < mostSteady;
      if (fits) return true;
      this.untold[hasNews ? "news" : "steady"]++;
      if (monitor) this.untold.watched++;
      return false;
    });
  }

  counts(): Pick<Gathered, "untold" | "expectedFalseNotices"> {
    return { untold: { ...this.untold }, expectedFalseNotices: this.expected };
  }
}

/**
 * Reads back what the workers wrote for these tables, one at a time, so that memory stays within bounds whatever their
 * number. `expectedFalseNotices` sums over all watched series what chance alone would bring in a year: the false-alarm
 * rate of a reference, as often as a year uses up its looks.
 */
export async function gatherTables(
  store: ObjectStore,
  asOf: string,
  names: readonly string[],
): Promise<Gathered> {
  const tables: TableFacts[] = [];
  const failed: FailedTable[] = [];
  const left: string[] = [];
  const gathering = new Gathering();
  const modelOf = modelReader(store, asOf);
  for (const table of names) {
    const model = await modelOf(table);
    if (model) {
      const series = gathering.take(model.series.map((one) => one.facts));
      tables.push({ table, series, problems: model.problems });
      continue;
    }
    const problems = await readDocument<ProblemsDocument>(store, problemsKey(asOf, table));
    if (problems)
      failed.push({
        table,
        hasForecast: await hasForecast(store, table, asOf),
        problems: problems.problems,
      });
    else left.push(table);
  }
  return { tables, failed, left, ...gathering.counts() };
}

/** The tables that a plan found gone, and whether a forecast of each stands. */
export async function gatherGone(store: ObjectStore, { asOf, gone = [] }: Plan): Promise<GoneTable[]> {
  const tables: GoneTable[] = [];
  for (const table of gone) tables.push({ table, hasForecast: await hasForecast(store, table, asOf) });
  return tables;
}

/** The facts of a whole run. */
export function runFacts(
  plan: Plan,
  gathered: Gathered,
  gone: readonly GoneTable[],
  undelivered: RunFacts["undelivered"],
): RunFacts {
  const { tables, failed, left, untold, expectedFalseNotices } = gathered;
  return {
    asOf: plan.asOf,
    tables,
    failed: [...plan.refused, ...failed],
    left,
    gone,
    untold,
    expectedFalseNotices,
    undelivered,
  };
}
