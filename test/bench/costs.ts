import type prices from "./prices.json";

export type Prices = typeof prices;

export interface Requests {
  readonly puts: number;
  readonly gets: number;
  readonly lists: number;
}

/** What was measured, and the few things that could not be. */
export interface Measured {
  /** Of one core, for one series of a packed table, in a later run. */
  readonly millisecondsPerSeries: number;
  /** Requests for one table and run, closing included, and those of a run as such. */
  readonly requestsPerTable: Requests;
  readonly requestsPerRun: Requests;
  /** Bytes that one run leaves for one series: model and forecasts. */
  readonly bytesPerSeries: number;
  /** Bytes that one run leaves as such: messages, and a report that draws its full hundred series. */
  readonly bytesPerRun: number;
  /** Taken, not measured: time of one request from Lambda to S3, of which four are under way at once. */
  readonly millisecondsPerRequest: number;
}

export interface Scenario {
  readonly name: string;
  readonly series: number;
  readonly seriesPerTable: number;
  readonly runsPerMonth: number;
  readonly fleet: boolean;
}

/** Dollars a month. */
export interface Cost {
  readonly compute: number;
  readonly requests: number;
  readonly storageAfterAYear: number;
  readonly watching: number;
  readonly total: number;
}

const memoryGigabytes = 1769 / 1024;
const hoursPerMonth = 730;
const tablesPerPortion = 25;
const underWay = 4;
/** The watch looks every six hours; an invocation of it takes about half a second, a cold start included. */
const watchesPerMonth = hoursPerMonth / 6;
const watchSeconds = 0.5;
/** Start, planning, digest and delivery of a run. */
const runSeconds = 10;
const logBytesPerRun = 20_000;

/**
 * What a deployment costs a month at list prices, nothing taken off for free tiers: compute by the gigabyte-second;
 * requests to S3, Lambda, Step Functions and the Scheduler; what a year of runs has left in the store; and the
 * alarms, metrics, dashboard, secret, traces and logs that watch over it.
 */
export function monthlyCost(scenario: Scenario, measured: Measured, prices: Prices): Cost {
  const { series, seriesPerTable, runsPerMonth, fleet } = scenario;
  const tables = Math.ceil(series / seriesPerTable);
  const { puts, gets, lists } = measured.requestsPerTable;
  const waiting = (tables * (puts + gets + lists) * measured.millisecondsPerRequest) / underWay;
  const secondsPerRun = (series * measured.millisecondsPerSeries + waiting) / 1000 + runSeconds;
  const seconds = runsPerMonth * secondsPerRun + watchesPerMonth * watchSeconds;
  const compute = seconds * memoryGigabytes * prices.lambdaArmGigabyteSecond;

  const portions = fleet ? Math.ceil(tables / tablesPerPortion) : 0;
  const invocations = runsPerMonth * (1 + (fleet ? portions + 1 : 0)) + watchesPerMonth;
  // A portion is a child execution of one state: start, task, end. The parent has four states.
  const transitions = fleet ? runsPerMonth * (3 * portions + 6) : 0;
  const priceOf = (count: Requests) =>
    count.puts * prices.s3Put + count.gets * prices.s3Get + count.lists * prices.s3List;
  const requests =
    runsPerMonth * (tables * priceOf(measured.requestsPerTable) + priceOf(measured.requestsPerRun)) +
    watchesPerMonth * 3 * prices.s3List +
    invocations * prices.lambdaRequest +
    transitions * prices.stepFunctionsTransition +
    (runsPerMonth + watchesPerMonth) * prices.schedulerInvocation;

  const bytes = series * measured.bytesPerSeries + measured.bytesPerRun;
  const storedGigabytes = (12 * runsPerMonth * bytes) / 1e9;
  const storageAfterAYear = storedGigabytes * prices.s3GigabyteMonth;

  const alarmMetrics = fleet ? 12 : 5;
  const metricHours = 8 * runsPerMonth + watchesPerMonth;
  const watching =
    prices.secretMonth +
    runsPerMonth * prices.secretCall +
    alarmMetrics * prices.alarmMetricMonth +
    (metricHours / hoursPerMonth) * prices.customMetricMonth +
    prices.dashboardMonth +
    ((invocations * logBytesPerRun) / 1e9) * prices.logGigabyte +
    invocations * prices.traceRecorded;

  return {
    compute,
    requests,
    storageAfterAYear,
    watching,
    total: compute + requests + storageAfterAYear + watching,
  };
}

/** The scenarios of the README. */
export const scenarios: readonly Scenario[] = [
  {
    name: "one business, 20 series in 4 tables",
    series: 20,
    seriesPerTable: 5,
    runsPerMonth: 52 / 12,
    fleet: false,
  },
  {
    name: "10,000 series, 100 a table",
    series: 10_000,
    seriesPerTable: 100,
    runsPerMonth: 52 / 12,
    fleet: true,
  },
  {
    name: "a million series, 100 a table",
    series: 1_000_000,
    seriesPerTable: 100,
    runsPerMonth: 52 / 12,
    fleet: true,
  },
];

const dollars = (amount: number) => (amount < 0.005 ? "under 0.01" : amount.toFixed(2));

/** The table as Markdown. */
export function costTable(measured: Measured, prices: Prices): string {
  const rows = scenarios.map((scenario) => {
    const cost = monthlyCost(scenario, measured, prices);
    const cells = [cost.compute, cost.requests, cost.storageAfterAYear, cost.watching, cost.total];
    return `| ${scenario.name} | ${cells.map(dollars).join(" | ")} |`;
  });
  return [
    "| weekly runs, US dollars a month | compute | requests | storage after a year | watching | all |",
    "| --- | ---: | ---: | ---: | ---: | ---: |",
    ...rows,
  ].join("\n");
}
