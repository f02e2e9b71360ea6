import { uniformNumbers } from "../../lib/drift/randomNumbers.ts";
import { polarNormal } from "../../lib/numeric/polarNormal.ts";

interface SeriesPlan {
  readonly seed: number;
  readonly length: number;
  readonly coefficient: number;
  readonly changeAt?: number;
  readonly coefficientAfter?: number;
  /** Added from `changeAt` on. */
  readonly level?: number;
  /** Shocks are multiplied by this from `changeAt` on. */
  readonly shockSize?: number;
}

/** An AR(1) with unit normal shocks that may change at one index. */
export function simulatedSeries(plan: SeriesPlan): number[] {
  const normal = polarNormal(uniformNumbers(plan.seed));
  const { changeAt = plan.length } = plan;
  let deviation = 0;
  for (let time = 0; time < 100; time++) deviation = plan.coefficient * deviation + normal();
  return Array.from({ length: plan.length }, (_, time) => {
    const changed = time >= changeAt;
    const coefficient = changed ? (plan.coefficientAfter ?? plan.coefficient) : plan.coefficient;
    deviation = coefficient * deviation + normal() * (changed ? (plan.shockSize ?? 1) : 1);
    return deviation + (changed ? (plan.level ?? 0) : 0);
  });
}
