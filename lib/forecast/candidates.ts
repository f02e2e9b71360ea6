/** How a candidate treats the drift of its differences: none, that of a recent stretch, that of the whole series. */
export type DriftKind = "none" | "local" | "whole";

/** One way to make a series stationary, before an autoregression is fitted to what is left. */
export interface Preparation {
  /** Lags differenced, in turn; empty for levels. */
  readonly differences: readonly number[];
  /** Season length of the profile taken off, 0 for none. */
  readonly season: number;
  /** Where the profile is estimated: on levels before differencing, or as means of the differenced series. */
  readonly profile: "level" | "mean" | "none";
  /** Whether a straight line is taken off first. */
  readonly line: boolean;
  readonly drifts: readonly DriftKind[];
}

const ALL_DRIFTS: readonly DriftKind[] = ["none", "local", "whole"];

/**
 * The bank of preparations: levels about a mean, levels about a line, first differences with three kinds of drift,
 * second differences. With a season: these after a profile is taken off, first differences also about a profile of
 * their own, seasonal differences, levels about either profile, and plain levels, whose long lags carry the season. A
 * further, longer season adds its levels about a profile, with and without a line, and its differences; a series with
 * several seasons moves in steps too short for a drift a step to matter, and goes without. Simple and unlike each
 * other, for it is what candidates do not share that makes an average better than its parts.
 */
export function preparations(seasons: readonly number[]): Preparation[] {
  const plain = { season: 0, profile: "none", line: false } as const;
  const levels: Preparation = { ...plain, differences: [], drifts: ["whole"] };
  if (seasons.length === 0) {
    return [
      { ...plain, differences: [1], drifts: ALL_DRIFTS },
      { ...plain, differences: [1, 1], drifts: ["none"] },
      levels,
      { ...levels, line: true },
    ];
  }
  const bank: Preparation[] = [levels];
  seasons.forEach((season, place) => {
    const level = { season, profile: "level", line: false } as const;
    const mean = { season, profile: "mean", line: false } as const;
    const first = place === 0;
    const single = seasons.length === 1;
    bank.push({ ...level, differences: [1], drifts: single ? ALL_DRIFTS : ["none"] });
    bank.push({ ...plain, differences: [season], drifts: single ? ["none", "whole"] : ["none"] });
    bank.push({ ...mean, differences: [], drifts: ["whole"] });
    bank.push({ ...level, differences: [], drifts: ["whole"] });
    bank.push({ ...level, differences: [], line: true, drifts: ["whole"] });
    if (!first) return;
    bank.push({ ...mean, differences: [1], drifts: single ? ["none", "whole"] : ["none"] });
    bank.push({ ...level, differences: [1, 1], drifts: ["none"] });
  });
  return bank;
}

/** A short name for analysts, such as `log, differences of 1, profile of 12, local drift`. */
export function candidateName(scale: string, preparation: Preparation, drift: DriftKind): string {
  const differences =
    preparation.differences.length === 0
      ? `levels${preparation.line ? " about a line" : ""}`
      : `differences of ${preparation.differences.join(" and ")}`;
  const profile =
    preparation.profile === "none"
      ? ""
      : `, profile of ${preparation.season}${preparation.profile === "level" ? " taken off first" : ""}`;
  const steady = preparation.differences.length === 0 || drift === "none" ? "" : `, ${drift} drift`;
  return `${scale}, ${differences}${profile}${steady}`;
}
