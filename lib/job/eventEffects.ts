import { fitAutoregression } from "../autoregression/fitAutoregression.ts";
import { describeSeries } from "../forecast/describingModel.ts";
import { countObserved } from "../numeric/sums.ts";
import { type EventColumn, eventColumns } from "../series/eventColumns.ts";
import type { KnownEvent } from "../series/readEvents.ts";
import type { Series } from "../series/series.ts";
import type { Finding } from "../words/facts.ts";
import { distinctEvents } from "./distinctEvents.ts";

type EventFinding = Extract<Finding, { code: "event-effect" }>;

/** What known events did to a series and will do to the coming periods. */
export interface EventAdjustment {
  /** One entry a value, then one a coming period, in units of the series. */
  readonly effects: Float64Array;
  /** The series without them. */
  readonly values: Float64Array;
  readonly findings: readonly EventFinding[];
}

/** An effect within two standard errors of nothing is taken for nothing: common practice. */
const leastEvidence = 2;
/** Fewer values leave nothing to learn an effect from. */
const fewestValues = 20;

/**
 * Effects of known events, estimated jointly with level, trend, season and autoregression by generalised least squares
 * (exact maximum likelihood), on the scale of the data, from the values at index `began` on. Those with evidence are
 * taken off the past and added to the coming periods; everything else said of the series is about what is left.
 */
export function adjustForEvents(
  series: Series,
  began: number,
  events: readonly KnownEvent[],
  context: {
    readonly table: string;
    readonly horizon: number;
    readonly timeZone: string;
    /** Names the coming periods, 0 the next. */
    readonly periodOf: (ahead: number) => string;
  },
): EventAdjustment {
  const { values, period } = series;
  const effects = new Float64Array(values.length + context.horizon);
  const unchanged = { effects, values, findings: [] };
  const open = values.slice().fill(Number.NaN, 0, began);
  const columns =
    events.length > 0 ? inGivenOrder(eventColumns(events, { ...series, values: open }, context), events) : [];
  if (columns.length === 0) return unchanged;
  const estimates = estimate(open, began, columns, period);
  if (!estimates) return unchanged;
  const told = estimates.filter((one) => Math.abs(one.effect) > leastEvidence * one.standardError);
  for (const { column, effect } of told) {
    column.values.forEach((share, since) => {
      effects[began + since] += effect * share;
    });
  }
  return {
    effects,
    values: values.map((value, index) => value - effects[index]),
    findings: told.map(({ column, effect, standardError }) => ({
      code: "event-effect",
      name: column.name,
      effect,
      standardError,
      coming: comingOf(column.values.subarray(values.length - began), effect, context.periodOf),
    })),
  };
}

/** The coming periods an event falls in. */
function comingOf(shares: Float64Array, effect: number, periodOf: (ahead: number) => string) {
  return Array.from(shares.keys())
    .filter((ahead) => shares[ahead] !== 0)
    .map((ahead) => ({ period: periodOf(ahead), amount: effect * shares[ahead] }));
}

/** As the events were given: those of the store's own files come before public holidays. */
function inGivenOrder(columns: readonly EventColumn[], events: readonly KnownEvent[]): EventColumn[] {
  const place = new Map<string, number>();
  for (const { name } of events) if (!place.has(name)) place.set(name, place.size);
  return [...columns].sort((a, b) => (place.get(a.name) ?? 0) - (place.get(b.name) ?? 0));
}

/** Effects of the events that can be told apart, by columns that begin at `began`. */
function estimate(
  open: Float64Array,
  began: number,
  columns: readonly EventColumn[],
  period: Series["period"],
) {
  const values = open.subarray(began);
  const observed = countObserved(values);
  if (observed < fewestValues) return undefined;
  try {
    const { regressors, fit } = describeSeries(values, { period });
    const terms = regressors.length > 0 ? regressors : [new Float64Array(values.length).fill(1)];
    const since = columns.map((column) => ({ ...column, values: column.values.subarray(began) }));
    // A tenth as many events as values at most, the owner's own before public holidays.
    const distinct = distinctEvents(since, terms, values).slice(0, Math.floor(observed / 10));
    const all = [...terms, ...distinct.map((column) => column.values.subarray(0, values.length))];
    const { regression } = fitAutoregression(values, {
      order: fit.order,
      method: "maximum-likelihood",
      regressors: all,
    });
    return distinct.map((column, index) => ({
      column,
      effect: regression?.coefficients[terms.length + index] ?? 0,
      standardError: regression?.standardErrors[terms.length + index] ?? Number.POSITIVE_INFINITY,
    }));
  } catch (error) {
    // Too few values for any model, or all the same.
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}
