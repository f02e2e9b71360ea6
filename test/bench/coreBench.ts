import { execFile, execFileSync } from "node:child_process";
import { promisify } from "node:util";
import { burgReflections, reflectionWorkspace } from "../../lib/autoregression/burg.ts";
import { fitAutoregression } from "../../lib/autoregression/fitAutoregression.ts";
import { selectOrder } from "../../lib/autoregression/selectOrder.ts";
import { observedMean } from "../../lib/numeric/sums.ts";
import { simulate } from "../support/arbitraryProcess.ts";
import { startR } from "../support/r.ts";
import type { BenchRow } from "./benchRow.ts";

const LENGTH = 260;
const LIKELIHOOD_GOAL = "at least 30 times faster, at an equal or better likelihood";
const ORDER_GOAL = "at least 20 times faster";

/**
 * Speed of the AR core against R's own functions on one simulated AR(3) of 260 values: native R where `Rscript` is on
 * the PATH, and R in WebAssembly. Times are the best of several rounds, each in user time of its process, so that other
 * work on the machine does not count for either side.
 */
export async function coreBench(): Promise<BenchRow[]> {
  const values = simulate([0.5, -0.1, 0.2], LENGTH, 1);
  const likelihood = processTime(() => fitAutoregression(values, { order: 3, method: "maximum-likelihood" }));
  const order = processTime(() => selectOrder(values, { maxOrder: 26, criterion: "aic", method: "burg" }));
  const lean = processTime(() => leanOrder(values));
  const { logLikelihood } = fitAutoregression(values, { order: 3, method: "maximum-likelihood" });
  const rows: BenchRow[] = [];
  for (const r of [await nativeTimes(values), await wasmTimes(values)]) {
    if (r === undefined) continue;
    const better = logLikelihood - r.logLikelihood;
    rows.push(
      row(
        "exact ML, AR(3), n = 260",
        likelihood,
        `arima(method = "ML"), ${r.name}`,
        r.arima,
        LIKELIHOOD_GOAL,
      ),
      {
        name: "its log-likelihood minus R's",
        value: better,
        unit: "",
        against: r.name,
        ratio: Number.NaN,
        goal: "not below -1e-6",
      },
      row(
        "order 0..26 by Burg, with the chosen fit",
        order,
        `ar(method = "burg"), ${r.name}`,
        r.burg,
        ORDER_GOAL,
      ),
      row(
        "order 0..26 by Burg, the choice alone",
        lean,
        `ar(method = "burg"), ${r.name}`,
        r.burg,
        ORDER_GOAL,
      ),
    );
  }
  return rows;
}

function row(name: string, microseconds: number, against: string, theirs: number, goal: string): BenchRow {
  return {
    name,
    value: microseconds,
    unit: "µs",
    against: `${against}: ${theirs.toFixed(0)} µs`,
    ratio: theirs / microseconds,
    goal,
  };
}

const workspace = reflectionWorkspace(LENGTH, 26);

/** The order of least AIC as inner loops find it: no residuals, no standard errors. */
function leanOrder(values: Float64Array): number {
  burgReflections(values, observedMean(values), 26, workspace);
  let best = 0;
  let least = Number.POSITIVE_INFINITY;
  for (let p = 0; p <= 26; p++) {
    const aic = LENGTH * Math.log(workspace.innovationVariances[p]) + 2 * p;
    if (aic < least) {
      least = aic;
      best = p;
    }
  }
  return best;
}

/** User time of a call in microseconds: the best of ten rounds after a warm-up. */
function processTime(call: () => unknown): number {
  const calls = 2000;
  for (let i = 0; i < calls; i++) call();
  let best = Number.POSITIVE_INFINITY;
  for (let round = 0; round < 10; round++) {
    const before = process.cpuUsage();
    for (let i = 0; i < calls; i++) call();
    best = Math.min(best, process.cpuUsage(before).user / calls);
  }
  return best;
}

interface RTimes {
  readonly name: string;
  /** Microseconds a call. */
  readonly arima: number;
  readonly burg: number;
  readonly logLikelihood: number;
}

/** R code that leaves c(arima, burg, log-likelihood), user microseconds a call, best of five rounds. */
function timing(values: Float64Array): string {
  return `x <- c(${Array.from(values).join(",")})
    best <- function(calls, f) min(sapply(1:5, function(i) system.time(for (j in seq_len(calls)) f())[["user.self"]])) / calls * 1e6
    arima_time <- best(40, function() arima(x, c(3, 0, 0), method = "ML"))
    burg_time <- best(1000, function() ar(x, order.max = 26, method = "burg"))
    c(arima_time, burg_time, arima(x, c(3, 0, 0), method = "ML")$loglik)`;
}

async function nativeTimes(values: Float64Array): Promise<RTimes | undefined> {
  try {
    execFileSync("Rscript", ["--version"], { stdio: "ignore" });
  } catch {
    return undefined;
  }
  const code = `cat(format({ ${timing(values)} }, digits = 17))`;
  const { stdout } = await promisify(execFile)("Rscript", ["-e", code]);
  const [arima, burg, logLikelihood] = stdout.trim().split(/\s+/).map(Number);
  return { name: "native R", arima, burg, logLikelihood };
}

async function wasmTimes(values: Float64Array): Promise<RTimes> {
  const r = await startR();
  try {
    // R in WebAssembly has no user time: its wall clock stands in.
    const code = timing(values).replace('[["user.self"]]', '[["elapsed"]]');
    const [arima, burg, logLikelihood] = await r.evaluate(code);
    return { name: "R in WebAssembly", arima, burg, logLikelihood };
  } finally {
    r.end();
  }
}
