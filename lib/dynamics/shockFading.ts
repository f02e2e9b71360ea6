import { selectOrder } from "../autoregression/selectOrder.ts";
import { type UnitRootTest, unitRootTest } from "../autoregression/unitRootTest.ts";
import { withoutTerms } from "../autoregression/withoutTerms.ts";
import { type HalfLifeInterval, halfLifeInterval } from "./halfLifeInterval.ts";

/** What the data say about shocks, with the evidence it rests on. */
export interface ShockFading {
  readonly verdict: "fades" | "permanent" | "cannot-tell";
  /**
   * `evidence-agrees` behind a verdict. `too-little-data` when nothing can be rejected; `evidence-conflicts` when both
   * sides are, as after a change of level, which looks permanent to one test and like quick fading to another.
   */
  readonly reason: "evidence-agrees" | "too-little-data" | "evidence-conflicts";
  /** Null hypothesis: shocks are permanent. */
  readonly dickeyFullerGls: UnitRootTest;
  /** Null hypothesis: shocks fade. */
  readonly kpss: UnitRootTest;
  /** Range of the half-life: the one given, else that of the autoregression that Burg's method and AICc choose. */
  readonly halfLife: HalfLifeInterval;
}

const SIGNIFICANCE = 0.05;
/** Each of the two looks for evidence against permanence, so that both together keep the 5 %. */
const EACH = SIGNIFICANCE / 2;

/**
 * Whether shocks to a series fade or stay for ever. A test that does not reject proves nothing by itself
 * (Kwiatkowski et al. 1992, section 5), so both hypotheses are put to the test:
 *
 * - against permanence, at 5 % in all: DF-GLS at 2.5 %, or fewer than 2.5 % of the half-life's replications without an end;
 * - against fading: KPSS at 5 %.
 *
 * `fades` needs evidence against permanence and none against fading, `permanent` the reverse; with both or neither the
 * data cannot tell.
 *
 * Throws as `unitRootTest` does: gaps, constant values, or too few of them.
 *
 * @example shockFading(lh, { trend: false }).verdict // "fades"
 */
export function shockFading(
  values: ArrayLike<number>,
  options: {
    readonly trend: boolean;
    readonly seed?: number;
    /** Range of the half-life, where a fit has given it already. */
    readonly halfLife?: HalfLifeInterval;
  },
): ShockFading {
  const { trend, seed } = options;
  const dickeyFullerGls = unitRootTest(values, { kind: "dickey-fuller-gls", trend });
  const kpss = unitRootTest(values, { kind: "kpss", trend });
  const halfLife = options.halfLife ?? halfLifeOf(values, trend, seed);
  const againstPermanence = dickeyFullerGls.pValue < EACH || halfLife.permanentShare < EACH;
  const againstFading = kpss.pValue < SIGNIFICANCE;
  return { ...judge(againstPermanence, againstFading), dickeyFullerGls, kpss, halfLife };
}

/** Of the autoregression that Burg's method and AICc choose. */
function halfLifeOf(values: ArrayLike<number>, trend: boolean, seed: number | undefined): HalfLifeInterval {
  const n = values.length;
  const maxOrder = Math.min(Math.floor(10 * Math.log10(n)), Math.floor(n / 4));
  const departures = withoutTerms(values, trend);
  const { fit } = selectOrder(departures, { maxOrder, criterion: "aicc", method: "burg" });
  return halfLifeInterval(fit, { estimated: trend ? "trend" : "estimate", level: 95, seed });
}

function judge(
  againstPermanence: boolean,
  againstFading: boolean,
): { verdict: ShockFading["verdict"]; reason: ShockFading["reason"] } {
  if (againstPermanence && againstFading) return { verdict: "cannot-tell", reason: "evidence-conflicts" };
  if (againstPermanence) return { verdict: "fades", reason: "evidence-agrees" };
  if (againstFading) return { verdict: "permanent", reason: "evidence-agrees" };
  return { verdict: "cannot-tell", reason: "too-little-data" };
}
