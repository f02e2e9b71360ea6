import { type ScaleLinear, scaleLinear } from "d3-scale";
import { side } from "./plot.ts";

interface AxisScale {
  readonly scale: ScaleLinear<number, number>;
  readonly ticks: readonly number[];
  /** The decimal place that labels of the ticks need. */
  readonly place: number;
}

/** A scale from the bottom of the picture to its top over all given values, its ends at round numbers. */
export function verticalScale(values: readonly (number | null | undefined)[], ticks = 4): AxisScale {
  return axisScale(values, [side, 0], ticks);
}

/** The same from left to right. */
export function horizontalScale(values: readonly (number | null | undefined)[], ticks = 4): AxisScale {
  return axisScale(values, [0, side], ticks);
}

function axisScale(
  values: readonly (number | null | undefined)[],
  ends: readonly [number, number],
  ticks: number,
): AxisScale {
  const present = values.filter(
    (value): value is number => typeof value === "number" && Number.isFinite(value),
  );
  let low = present.length > 0 ? Math.min(...present) : 0;
  let high = present.length > 0 ? Math.max(...present) : 1;
  if (high - low <= 1e-9 * Math.max(Math.abs(low), Math.abs(high))) {
    const air = Math.abs(low) / 10 || 1;
    low -= air;
    high += air;
  }
  const scale = scaleLinear([low, high], ends).nice(ticks);
  const at = scale.ticks(ticks);
  const step = at.length > 1 ? at[1] - at[0] : 1;
  return { scale, ticks: at, place: Math.min(1, 10 ** Math.floor(Math.log10(step) + 1e-9)) };
}
