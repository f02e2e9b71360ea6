/** How a candidate treats the drift of its differences. */
export type DriftKind = "none" | "recent" | "whole";

/** One way to make a series stationary, before an autoregression is fitted to what is left. */
export interface Preparation {
  /** Lags differenced, in turn; empty for levels. */
  readonly differences: readonly number[];
  /** Season length of the profile taken off, 0 for none. */
  readonly season: number;
  /** Where the profile is estimated: on levels before differencing, or as means of the differenced series. */
  readonly profile: "level" | "mean" | "none";
  readonly drifts: readonly DriftKind[];
}

const ALL_DRIFTS: readonly DriftKind[] = ["none", "recent", "whole"];

/**
 * The bank of preparations. Without a season: levels about a mean, first differences, second differences. For each
 * season length: first differences after a level profile and about a profile of their own, seasonal differences, and
 * levels about a profile. First differences come with no drift, a recent drift and that of the whole series.
 */
export function preparations(seasons: readonly number[]): Preparation[] {
  const bank: Preparation[] = [];
  if (seasons.length === 0) {
    bank.push({ differences: [1], season: 0, profile: "none", drifts: ALL_DRIFTS });
    bank.push({ differences: [1, 1], season: 0, profile: "none", drifts: ["none"] });
    bank.push({ differences: [], season: 0, profile: "none", drifts: ["whole"] });
  }
  for (const season of seasons) {
    bank.push({ differences: [1], season, profile: "level", drifts: ALL_DRIFTS });
    bank.push({ differences: [1], season, profile: "mean", drifts: ALL_DRIFTS });
    bank.push({ differences: [season], season: 0, profile: "none", drifts: ALL_DRIFTS });
    bank.push({ differences: [], season, profile: "mean", drifts: ["whole"] });
  }
  return bank;
}

/** A short name for analysts, such as `log, differences of 1, profile of 12, recent drift`. */
export function candidateName(scale: string, preparation: Preparation, drift: DriftKind): string {
  const differences =
    preparation.differences.length === 0
      ? "levels"
      : `differences of ${preparation.differences.join(" and ")}`;
  const profile =
    preparation.profile === "none"
      ? ""
      : `, profile of ${preparation.season}${preparation.profile === "level" ? " taken off first" : ""}`;
  const steady = preparation.differences.length === 0 ? "" : drift === "none" ? "" : `, ${drift} drift`;
  return `${scale}, ${differences}${profile}${steady}`;
}
