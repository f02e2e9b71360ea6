/** How a model is estimated. Only `maximum-likelihood` accepts gaps (`NaN`). */
export type EstimationMethod = "yule-walker" | "burg" | "least-squares" | "maximum-likelihood";

/** The numbers that define an AR process: x_t − mean = Σ φ_j (x_{t−j} − mean) + e_t, Var e = innovationVariance. */
export interface AutoregressiveProcess {
  /** φ_1..φ_p. */
  readonly coefficients: ArrayLike<number>;
  /** The process mean, not the regression constant. */
  readonly mean: number;
  readonly innovationVariance: number;
}

export interface AutoregressiveFit {
  readonly method: EstimationMethod;
  readonly order: number;
  /** φ_1..φ_p. */
  readonly coefficients: Float64Array;
  readonly standardErrors: Float64Array;
  readonly mean: number;
  /** `NaN` where the method gives none; 0 when the mean is fixed at zero. */
  readonly meanStandardError: number;
  readonly innovationVariance: number;
  readonly logLikelihood: number;
  readonly aic: number;
  readonly aicc: number;
  readonly bic: number;
  /** Values that were not gaps. */
  readonly observations: number;
  /** One a value of the input: one-step prediction errors, `NaN` where none exists. */
  readonly residuals: Float64Array;
  readonly regression?: { readonly coefficients: Float64Array; readonly standardErrors: Float64Array };
}
