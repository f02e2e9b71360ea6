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

const DRIFTS: readonly DriftKind[] = ["none", "local", "whole"];

/**
 * The bank of preparations: levels about a mean, levels about a line, first differences with three kinds of drift,
 * second differences. With seasons, for each length: all of these after a profile is taken off, first differences
 * also about a profile of their own, and seasonal differences. Simple and unlike each other, for it is the
 * differences between candidates that make an average better than its parts.
 */
export function preparations(seasons: readonly number[]): Preparation[] {
  const bank: Preparation[] = [];
  const plain = { season: 0, profile: "none", line: false } as const;
  if (seasons.length === 0) {
    bank.push({ ...plain, differences: [1], drifts: DRIFTS });
    bank.push({ ...plain, differences: [1, 1], drifts: ["none"] });
    bank.push({ ...plain, differences: [], drifts: ["whole"] });
    bank.push({ ...plain, differences: [], line: true, drifts: ["whole"] });
  }
  for (const season of seasons) {
    const level = { season, profile: "level", line: false } as const;
    const mean = { season, profile: "mean", line: false } as const;
    bank.push({ ...level, differences: [1], drifts: DRIFTS });
    bank.push({ ...mean, differences: [1], drifts: DRIFTS });
    bank.push({ ...plain, differences: [season], drifts: DRIFTS });
    bank.push({ ...level, differences: [1, 1], drifts: ["none"] });
    bank.push({ ...mean, differences: [], drifts: ["whole"] });
    bank.push({ ...level, differences: [], line: true, drifts: ["whole"] });
  }
  return bank;
}

/** A short name for analysts, such as `log, differences of 1, profile of 12, local drift`. */
export function candidateName(scale: string, preparation: Preparation, drift: DriftKind): string {
  const differences =
    preparation.differences.length === 0
      ? "levels"
      : `differences of ${preparation.differences.join(" and ")}`;
  const profile =
    preparation.profile === "none"
      ? ""
      : `, profile of ${preparation.season}${preparation.profile === "level" ? " taken off first" : ""}`;
  const steady = preparation.differences.length === 0 || drift === "none" ? "" : `, ${drift} drift`;
  return `${scale}, ${differences}${profile}${steady}`;
}
