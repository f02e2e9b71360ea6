/** A wide weekly table of AR(1) series around 200 that ends before December 2026, from a fixed seed. */
export function packedTable(series: number, weeks: number, seed: number): string {
  let state = seed >>> 0;
  const uniform = () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0; // Numerical Recipes' linear congruential generator
    return state / 2 ** 32;
  };
  const deviations = new Float64Array(series);
  const last = Date.UTC(2026, 10, 23);
  const rows = Array.from({ length: weeks }, (_, week) => {
    const date = new Date(last - (weeks - 1 - week) * 7 * 86_400_000).toISOString().slice(0, 10);
    const cells = Array.from(deviations, (deviation, index) => {
      const shock = 10 * (uniform() + uniform() + uniform() - 1.5);
      deviations[index] = (0.2 + 0.7 * (index / series)) * deviation + shock;
      return (200 + deviations[index]).toFixed(1);
    });
    return `${date},${cells.join(",")}`;
  });
  return [`week,${Array.from({ length: series }, (_, index) => `s${index}`).join(",")}`, ...rows, ""].join(
    "\n",
  );
}
