import { type LevinsonOrders, levinson } from "../numeric/levinson.ts";
import { autocovariancesAbout } from "./sampleMoments.ts";

/**
 * Yule–Walker estimates of every order 0..maxOrder: the Levinson recursion on sample autocovariances with divisor
 * n, so every fit is stationary (Brockwell & Davis 1991, section 8.1). The innovation variance is the recursion's
 * own, without R's factor n/(n − p − 1).
 */
export function yuleWalkerAllOrders(
  values: ArrayLike<number>,
  centre: number,
  maxOrder: number,
): LevinsonOrders {
  return levinson(autocovariancesAbout(values, centre, maxOrder), maxOrder);
}
