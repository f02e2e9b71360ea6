import { randomNormal } from "./randomNormal.ts";

/** Numbers drawn so far from one seed, and the generator that draws the next. */
let drawn = { seed: Number.NaN, values: new Float64Array(0), next: () => Number.NaN };
/** No more than this many are kept between calls (8 MB). */
const most = 1_000_000;

/**
 * The first `count` numbers of `randomNormal(seed)`, to be read only. They are remembered for the last seed asked for: a
 * bootstrap that starts from the same seed for every series would draw the same numbers each time, at most of its cost.
 */
export function recalledNormals(seed: number, count: number): Float64Array {
  if (drawn.seed !== seed) drawn = { seed, values: new Float64Array(0), next: randomNormal(seed) };
  const known = drawn.values.length;
  if (count <= known) return drawn.values.subarray(0, count);
  const values = new Float64Array(count);
  values.set(drawn.values);
  const next = count <= most ? drawn.next : continued(seed, known);
  for (let i = known; i < count; i++) values[i] = next();
  if (count <= most) drawn.values = values;
  return values;
}

/** A generator of its own that stands where `known` numbers were drawn. */
function continued(seed: number, known: number): () => number {
  const next = randomNormal(seed);
  for (let i = 0; i < known; i++) next();
  return next;
}
