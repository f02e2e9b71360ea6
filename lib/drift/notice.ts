/** What a lasting change is a change of. */
export type ChangeKind = "persistence" | "level" | "trend" | "shock-size" | "season";

/** How the series behaves on one side of a change, in the units of the series and in periods. */
export interface Behaviour {
  readonly order: number;
  readonly coefficients: readonly number[];
  /** Σ φ_i. */
  readonly persistence: number;
  /** Periods; `null` when shocks are permanent. */
  readonly halfLife: number | null;
  readonly level: number;
  /** Change of the trend line a period; 0 without a trend term. */
  readonly slope: number;
  /** Standard deviation of the innovations. */
  readonly shockSize: number;
  /** Values the numbers rest on. */
  readonly observations: number;
}

/** The statistic that passed its boundary first, as it stood at the look that brought the notice. */
export interface Passed {
  readonly kind: ChangeKind;
  readonly statistic: number;
  readonly look: number;
}

/** Numbers a reader can check, at the look that called the change: its notice, or its confirmation. */
export interface Evidence {
  readonly statistic: number;
  readonly boundary: number;
  readonly looksUsed: number;
  readonly looks: number;
  /** What the change was noticed by, `statistic` being of the same kind; documents of earlier versions have none. */
  readonly passed?: Passed;
  /** Chance of any false notice over all `looks`. */
  readonly falseAlarmRate: number;
  /** Large shocks came in clusters before, too: false notices are then more frequent than the rate says. */
  readonly caution?: "clustered-shocks";
}

/** A lasting change. `index` counts values from the first the monitor was started with. */
export interface ChangeNotice {
  readonly code: "change";
  readonly kind: ChangeKind;
  /** The other kind that fits nearly as well, if any. */
  readonly alternative: ChangeKind | null;
  /** `provisional` at the notice, `confirmed` eight looks later (the kind may then differ). */
  readonly status: "provisional" | "confirmed";
  /** Where the notice was made. */
  readonly noticedAt: number;
  /** First value of the new behaviour, with the range it lies in. */
  readonly change: { readonly index: number; readonly low: number; readonly high: number };
  readonly before: Behaviour;
  readonly after: Behaviour;
  readonly evidence: Evidence;
}

/** A one-off surprise: reported at once, never called lasting. */
export interface SurpriseNotice {
  readonly code: "surprise";
  readonly index: number;
  readonly value: number;
  readonly expected: number;
  /** In units of the one-step standard deviation, signed. */
  readonly size: number;
}

export type Notice = ChangeNotice | SurpriseNotice;
