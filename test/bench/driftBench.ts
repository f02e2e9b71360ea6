import { advanceMonitor } from "../../lib/drift/advanceMonitor.ts";
import { appendValue } from "../../lib/drift/appendValue.ts";
import { boundariesFor } from "../../lib/drift/boundaries.ts";
import { look } from "../../lib/drift/look.ts";
import { openLookState } from "../../lib/drift/lookState.ts";
import type { ChangeKind, ChangeNotice } from "../../lib/drift/notice.ts";
import { fitReference } from "../../lib/drift/reference.ts";
import { startMonitor } from "../../lib/drift/startMonitor.ts";
import { type BenchRow, benchRow } from "./benchRow.ts";
import { changeLook, type DriftCase, drawSeries } from "./driftCases.ts";

/** Series a stable case and a change case. */
const stableSeries = 1000;
const changedSeries = 600;
/** Not the seeds the boundaries were fitted with. */
const firstSeed = 0x5eed;

const stable: readonly DriftCase[] = [
  { name: "white", coefficients: [0] },
  { name: "φ .5", coefficients: [0.5] },
  { name: "φ .8", coefficients: [0.8] },
  { name: "φ .95", coefficients: [0.95] },
  { name: "AR(2) 1.2 −.6", coefficients: [1.2, -0.6] },
];

interface Goal {
  readonly power: number;
  readonly delay?: number;
  readonly kind?: number;
  readonly kindLater?: number;
  readonly dateError?: number;
}

const changes: readonly (DriftCase & { readonly kind: ChangeKind; readonly goal: Goal })[] = [
  {
    name: "φ .3→.7",
    coefficients: [0.3],
    coefficientsAfter: [0.7],
    kind: "persistence",
    goal: { power: 67, delay: 21, kind: 72, kindLater: 82 },
  },
  {
    name: "φ .8→.4",
    coefficients: [0.8],
    coefficientsAfter: [0.4],
    kind: "persistence",
    goal: { power: 32, delay: 31, kind: 94 },
  },
  {
    name: "level +1",
    coefficients: [0.5],
    level: 1,
    kind: "level",
    goal: { power: 68, delay: 24, kind: 83 },
  },
  {
    name: "level +2",
    coefficients: [0.5],
    level: 2,
    kind: "level",
    goal: { power: 99, delay: 10, kind: 80, kindLater: 90, dateError: 1 },
  },
  {
    name: "shock size ×1.5",
    coefficients: [0.5],
    shockSize: 1.5,
    kind: "shock-size",
    goal: { power: 70, delay: 20, kind: 82 },
  },
  {
    name: "shock size ×2",
    coefficients: [0.5],
    shockSize: 2,
    kind: "shock-size",
    goal: { power: 98, delay: 13, kind: 90 },
  },
  {
    name: "shock size ×1.5, t₅",
    coefficients: [0.5],
    shockSize: 1.5,
    tails: 5,
    kind: "shock-size",
    goal: { power: 45 },
  },
  {
    name: "shock size ×2, t₅",
    coefficients: [0.5],
    shockSize: 2,
    tails: 5,
    kind: "shock-size",
    goal: { power: 90 },
  },
];

const pitfalls: readonly { readonly one: DriftCase; readonly goal: string }[] = [
  { one: { name: "one outlier of 5 shocks", coefficients: [0.5], outliers: [5] }, goal: "at most 7" },
  {
    one: { name: "one outlier of 5 marginal deviations", coefficients: [0.5], outliers: [5.77] },
    goal: "at most 7",
  },
  { one: { name: "two adjacent outliers", coefficients: [0.5], outliers: [5, 5] }, goal: "at most 24" },
  {
    one: { name: "two adjacent outliers of either sign", coefficients: [0.5], outliers: [5, -5] },
    goal: "at most 24",
  },
  { one: { name: "three adjacent outliers", coefficients: [0.5], outliers: [5, 5, 5] }, goal: "at most 38" },
  { one: { name: "AR(2) .5 .3, order chosen", coefficients: [0.5, 0.3] }, goal: "at most 7" },
  {
    one: { name: "volatility clustering, GARCH .1 .8", coefficients: [0.5], clustering: [0.1, 0.8] },
    goal: "at most 9.5",
  },
];

/** The monitor against the goals: false notices, power, delay, kinds and dates, each with its Monte Carlo error. */
export async function driftBench(): Promise<BenchRow[]> {
  const rows: BenchRow[] = [];
  const rates: number[] = [];
  for (const start of [104, 156])
    for (const tails of [undefined, 5])
      for (const one of stable) {
        const rate = noticeRate({ ...one, tails }, start, stableSeries);
        rates.push(rate);
        const name = `false notices, ${one.name}, ${tails === undefined ? "normal" : "t₅"}, ${start} values`;
        rows.push(percent(name, rate, stableSeries, "no cell above 7"));
      }
  const mean = rates.reduce((sum, rate) => sum + rate, 0) / rates.length;
  rows.push(percent("false notices, mean of the cells", mean, stableSeries * rates.length, "5 ± 1"));
  for (const one of changes) rows.push(...changeRows(one));
  for (const { one, goal } of pitfalls)
    rows.push(
      percent(`lasting notices, ${one.name}`, noticeRate(one, 156, changedSeries), changedSeries, goal),
    );
  rows.push(...costRows());
  return rows;
}

/** Notices of lasting change that one series of each seed brings in a year of looks. */
function watchOne(one: DriftCase, start: number, seed: number): ChangeNotice[] {
  const series = drawSeries(one, start, seed);
  const monitor = startMonitor(series.subarray(0, start), { looks: 52, falseAlarmRate: 0.05 });
  const { notices } = advanceMonitor(monitor, series.subarray(start));
  return notices.filter((notice) => notice.code === "change");
}

const seedOf = (at: number) => firstSeed + 7_368_787 * at;

function noticeRate(one: DriftCase, start: number, series: number): number {
  let noticed = 0;
  for (let at = 0; at < series; at++) if (watchOne(one, start, seedOf(at)).length > 0) noticed++;
  return noticed / series;
}

function changeRows(one: DriftCase & { readonly kind: ChangeKind; readonly goal: Goal }): BenchRow[] {
  const delays: number[] = [];
  const dateErrors: number[] = [];
  let right = 0;
  let named = 0;
  let later = 0;
  let laterRight = 0;
  const changeAt = 156 + changeLook - 1;
  for (let at = 0; at < changedSeries; at++) {
    const [first, second] = watchOne(one, 156, seedOf(at));
    if (first === undefined || first.noticedAt < changeAt) continue;
    delays.push(first.noticedAt - changeAt + 1);
    dateErrors.push(Math.abs(first.change.index - changeAt));
    named++;
    if (first.kind === one.kind) right++;
    if (second === undefined) continue;
    later++;
    if (second.kind === one.kind) laterRight++;
  }
  const { goal } = one;
  const atLeast = (value: number | undefined) => (value === undefined ? "" : `at least ${value}`);
  const atMost = (value: number | undefined) => (value === undefined ? "" : `at most ${value}`);
  return [
    percent(`${one.name}: power`, delays.length / changedSeries, changedSeries, atLeast(goal.power)),
    plain(`${one.name}: median delay`, median(delays), "looks", atMost(goal.delay)),
    percent(`${one.name}: kind named right`, right / named, named, atLeast(goal.kind)),
    percent(`${one.name}: kind named right at +8`, laterRight / later, later, atLeast(goal.kindLater)),
    plain(`${one.name}: median date error`, median(dateErrors), "looks", atMost(goal.dateError)),
  ];
}

/** Time of one look late in a year, and of boundaries from the table and by bootstrap. */
function costRows(): BenchRow[] {
  const series = drawSeries(stable[1], 208, 1);
  const reference = fitReference(series.slice(0, 208), { trend: false, season: 0 }, undefined, 8);
  const state = openLookState(reference, 52, 52);
  for (let time = 208; time < 260; time++)
    appendValue(state, (series[time] - reference.centre) / reference.scale);
  const perLook = milliseconds(2000, () => look(state));
  const request = { looks: 52, falseAlarmRate: 0.05, seed: 1 };
  const table = milliseconds(2000, () => boundariesFor(reference, { ...request, bootstrap: false }));
  const bootstrap = milliseconds(1, () => boundariesFor(reference, { ...request, bootstrap: true }));
  return [
    plain("one look at 260 values", perLook, "ms", "at most 2"),
    plain("boundaries from the table", table, "ms", "at most 1500"),
    plain("boundaries by bootstrap", bootstrap, "ms", "at most 1500"),
  ];
}

function milliseconds(times: number, work: () => unknown): number {
  const from = performance.now();
  for (let i = 0; i < times; i++) work();
  return (performance.now() - from) / times;
}

function median(values: readonly number[]): number {
  return [...values].sort((a, b) => a - b)[values.length >> 1] ?? Number.NaN;
}

function percent(name: string, share: number, count: number, goal: string): BenchRow {
  const error = 100 * Math.sqrt((share * (1 - share)) / Math.max(1, count));
  return benchRow(name, 100 * share, `% ± ${error.toFixed(1)}`, { goal });
}

function plain(name: string, value: number, unit: string, goal: string): BenchRow {
  return benchRow(name, value, unit, { goal });
}
