import { leastSquares } from "../numeric/leastSquares.ts";
import { observedMean } from "../numeric/sums.ts";
import { tabulate } from "../numeric/tabulate.ts";
import { constantColumn, trendColumn } from "./regressionTerms.ts";

/** Values minus their mean, or minus their least-squares trend line. Takes no gaps. */
export function withoutTerms(values: ArrayLike<number>, trend: boolean): Float64Array {
  const n = values.length;
  const origin = observedMean(values);
  const terms = trend ? [constantColumn(n), trendColumn(n)] : [constantColumn(n)];
  const fit = leastSquares(
    terms,
    tabulate(n, (t) => values[t] - origin),
  );
  return fit?.residuals ?? new Float64Array(n);
}
