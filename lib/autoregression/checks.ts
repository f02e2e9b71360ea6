import { countObserved } from "../numeric/sums.ts";

/** Refuses infinite entries, and gaps too unless they are allowed; `operation` and `name` head the message. */
export function requireValues(
  operation: string,
  name: string,
  values: ArrayLike<number>,
  gaps: "gaps-allowed" | "no-gaps",
): void {
  if (typeof values !== "object" || values === null || !Number.isInteger(values.length)) {
    throw new TypeError(`${operation} needs ${name} to be an array of numbers, got ${String(values)}`);
  }
  if (values instanceof Float64Array && allFinite(values)) return;
  for (let i = 0; i < values.length; i++) {
    const value: unknown = values[i];
    if (typeof value !== "number") {
      throw new TypeError(`${operation} needs numbers in ${name}, got ${String(value)} at index ${i}`);
    }
    if (Number.isNaN(value) && gaps === "gaps-allowed") continue;
    if (!Number.isFinite(value)) {
      throw new RangeError(
        `${operation} needs finite ${name}${gaps === "no-gaps" ? " without gaps" : ""}, got ${value} at index ${i}`,
      );
    }
  }
}

/** The quick way through for what is nearly always the case. */
function allFinite(values: Float64Array): boolean {
  let zero = 0;
  for (let i = 0; i < values.length; i++) zero += values[i] * 0;
  return zero === 0;
}

/** Refuses what is not a whole number of at least `least`. */
export function requireWhole(operation: string, name: string, value: number, least: number): void {
  if (!Number.isInteger(value) || value < least) {
    throw new RangeError(
      `${operation} needs ${name} to be a whole number of at least ${least}, got ${value}`,
    );
  }
}

/** Refuses a number that is not finite and positive. */
export function requirePositive(operation: string, name: string, value: number): void {
  if (!(value > 0 && Number.isFinite(value))) {
    throw new RangeError(`${operation} needs ${name} to be positive and finite, got ${value}`);
  }
}

/** Refuses fewer than `least` observed values. */
export function requireObserved(operation: string, values: ArrayLike<number>, least: number): void {
  const observed = countObserved(values);
  if (observed < least) {
    throw new RangeError(`${operation} needs at least ${least} observed values, got ${observed}`);
  }
}
