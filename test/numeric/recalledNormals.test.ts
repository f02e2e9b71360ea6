import { describe, expect, it } from "vitest";
import { randomNormal } from "../../lib/numeric/randomNormal.ts";
import { recalledNormals } from "../../lib/numeric/recalledNormals.ts";

function fresh(seed: number, count: number): Float64Array {
  const next = randomNormal(seed);
  return Float64Array.from({ length: count }, next);
}

describe("recalledNormals", () => {
  it("gives the numbers of a fresh generator, at first, fewer, further on and beside another seed", () => {
    for (const [seed, count] of [
      [11, 500],
      [11, 200],
      [11, 900],
      [12, 300],
      [11, 700],
    ])
      expect(recalledNormals(seed, count)).toEqual(fresh(seed, count));
  });

  it("gives more than it keeps, and goes on from there", () => {
    const all = fresh(5, 1_000_100);
    recalledNormals(5, 1000);
    expect(Buffer.compare(bytes(recalledNormals(5, 1_000_100)), bytes(all))).toBe(0);
    expect(recalledNormals(5, 2000)).toEqual(all.subarray(0, 2000));
  });
});

const bytes = (values: Float64Array) => new Uint8Array(values.buffer, values.byteOffset, values.byteLength);
