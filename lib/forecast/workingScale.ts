/** The scale on which an autoregression is fitted. */
export interface WorkingScale {
  readonly name: "raw" | "log" | "square-root";
  forward(value: number): number;
  back(value: number): number;
  /**
   * Value that lies `distance` from `anchor` on the working scale, for quantiles. As `back(anchor + distance)`, except
   * that a logarithm grows straight on past a doubling: a percentage error is not believed to compound without end.
   */
  apart(anchor: number, distance: number): number;
  /** Derivative of `back`: how a small error on the working scale shows in units of the series. */
  slope(value: number): number;
}

/** exp overflows past 709; no forecast needs more than this. */
const LARGEST_EXPONENT = 690;

const RAW: WorkingScale = {
  name: "raw",
  forward: (value) => value,
  back: (value) => value,
  apart: (anchor, distance) => anchor + distance,
  slope: () => 1,
};

const LOG: WorkingScale = {
  name: "log",
  forward: Math.log,
  back: (value) => Math.exp(Math.min(value, LARGEST_EXPONENT)),
  apart: (anchor, distance) =>
    Math.exp(Math.min(anchor, LARGEST_EXPONENT)) *
    (distance > Math.LN2 ? 2 * (1 + distance - Math.LN2) : Math.exp(distance)),
  slope: (value) => Math.exp(Math.min(value, LARGEST_EXPONENT)),
};

const SQUARE_ROOT: WorkingScale = {
  name: "square-root",
  forward: Math.sqrt,
  // A root below zero would turn back up when squared: zero is the floor of the scale.
  back: (value) => (value > 0 ? value * value : 0),
  apart: (anchor, distance) => Math.max(0, anchor + distance) ** 2,
  slope: (value) => (value > 0 ? 2 * value : 0),
};

/**
 * Scales worth fitting on: always the raw one; the logarithm when every value is positive (steady percentages);
 * the square root when values touch zero but never pass it (counts), where a logarithm does not exist, and with
 * `between` beside the logarithm too, for growth that lies between straight and exponential.
 */
export function workingScales(values: ArrayLike<number>, between = false): readonly WorkingScale[] {
  let least = Number.POSITIVE_INFINITY;
  let most = 0;
  for (let t = 0; t < values.length; t++) {
    if (values[t] < least) least = values[t];
    if (values[t] > most) most = values[t];
  }
  // A value that is nothing beside the others (a till that was shut, an underflow) makes a meaningless logarithm.
  if (least > most * 1e-9) return between ? [RAW, LOG, SQUARE_ROOT] : [RAW, LOG];
  return least >= 0 ? [RAW, SQUARE_ROOT] : [RAW];
}
