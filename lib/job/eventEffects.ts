import { fitAutoregression } from "../autoregression/fitAutoregression.ts";
import { describeSeries } from "../forecast/describingModel.ts";
import { type EventColumn, eventColumns } from "../series/eventColumns.ts";
import type { KnownEvent } from "../series/readEvents.ts";
import type { Series } from "../series/series.ts";
import type { Finding } from "../words/facts.ts";

type EventFinding = Extract<Finding, { code: "event-effect" }>;

/** A series without the effects of known events, and what they add to the coming periods. */
export interface EventAdjustment {
  readonly values: Float64Array;
  /** One entry a coming period, in units of the series. */
  readonly coming: Float64Array;
  readonly findings: readonly EventFinding[];
}

/** An effect within two standard errors of nothing is taken for nothing: common practice. */
const leastEvidence = 2;

/**
 * Effects of known events, estimated jointly with level, trend, season and autoregression by generalised least squares
 * (exact maximum likelihood), on the scale of the data. Those with evidence are taken off the past and added to the
 * coming periods; everything else said of the series is about what is left.
 */
export function adjustForEvents(
  series: Series,
  events: readonly KnownEvent[],
  context: { readonly table: string; readonly horizon: number; readonly timeZone: string },
): EventAdjustment {
  const { values, period } = series;
  const unchanged = { values, coming: new Float64Array(context.horizon), findings: [] };
  const columns = events.length > 0 ? eventColumns(events, series, context) : [];
  if (columns.length === 0 || series.observed < 20 + 3 * columns.length) return unchanged;
  const found = columns.filter((_, index) => index < series.observed / 10);
  const effects = estimate(values, found, period);
  if (!effects) return unchanged;
  const told = effects.filter((one) => Math.abs(one.effect) > leastEvidence * one.standardError);
  const sumAt = (index: number) =>
    told.reduce((sum, { column, effect }) => sum + effect * column.values[index], 0);
  return {
    values: values.map((value, index) => value - sumAt(index)),
    coming: Float64Array.from({ length: context.horizon }, (_, step) => sumAt(values.length + step)),
    findings: told.map(({ column, effect, standardError }) => ({
      code: "event-effect",
      name: column.name,
      effect,
      standardError,
    })),
  };
}

function estimate(values: Float64Array, columns: readonly EventColumn[], period: Series["period"]) {
  try {
    const { regressors, fit } = describeSeries(values, { period });
    const terms = regressors.length > 0 ? regressors : [new Float64Array(values.length).fill(1)];
    const all = [...terms, ...columns.map((column) => column.values.subarray(0, values.length))];
    const { regression } = fitAutoregression(values, {
      order: fit.order,
      method: "maximum-likelihood",
      regressors: all,
    });
    return columns.map((column, index) => ({
      column,
      effect: regression?.coefficients[terms.length + index] ?? 0,
      standardError: regression?.standardErrors[terms.length + index] ?? Number.POSITIVE_INFINITY,
    }));
  } catch (error) {
    // Events that fall together, or on every period, cannot be told apart from the rest of the model.
    if (error instanceof RangeError) return undefined;
    throw error;
  }
}
