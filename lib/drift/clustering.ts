import type { Reference } from "./reference.ts";

/** Score that steady shocks hardly pass. */
const tolerated = 1;
const suspicious = 1.28;

/** Lags summed; squares beyond three shocks are cut so that one wild value does not decide. */
const lags = 5;
const largestSquare = 9;

/**
 * How plainly large shocks follow large ones in the reference: the sum of the first five autocorrelations of its
 * squared residuals, standardised to about N(0, 1) for independent shocks (after McLeod and Li 1983, one-sided).
 */
function clusteringScore({ residuals, order, isGap }: Reference): number {
  const squares: number[] = [];
  for (let time = order; time < residuals.length; time++)
    if (!isGap[time]) squares.push(Math.min(residuals[time] ** 2, largestSquare));
  const count = squares.length;
  const mean = squares.reduce((sum, square) => sum + square, 0) / count;
  const variance = squares.reduce((sum, square) => sum + (square - mean) ** 2, 0);
  let total = 0;
  for (let lag = 1; lag <= lags; lag++)
    for (let at = lag; at < count; at++) total += (squares[at] - mean) * (squares[at - lag] - mean);
  // Each autocorrelation is about N(−1/n, 1/n).
  return (total / variance + lags / count) * Math.sqrt(count / lags);
}

/**
 * Added to the boundary of the shock size: where shocks come in clusters, a stretch of large ones is no lasting
 * change, so more of it is asked for. Independent shocks score above one in a sixth of the references and pay
 * little for it; clustered ones (GARCH .1, .8) score about two.
 */
export function clusteringAllowance(reference: Reference): number {
  return Math.max(0, clusteringScore(reference) - tolerated);
}

/** Whether the shocks of a reference seem to come in clusters (one-sided, at 10 %): then the rate is a lower bound. */
export function hasClusters(reference: Reference): boolean {
  return clusteringScore(reference) > suspicious;
}
