import { compareFits } from "../drift/compareFits.ts";
import type { ComparisonFacts, ModelFacts } from "../words/facts.ts";

/** The describing model now against the one stored at `since`, coefficient by coefficient. */
export function comparisonFacts(since: string, before: ModelFacts, after: ModelFacts): ComparisonFacts {
  return {
    since,
    ...compareFits(before, after),
    persistence: { before: before.persistence, after: after.persistence },
    halfLife: { before: before.halfLife, after: after.halfLife },
  };
}
