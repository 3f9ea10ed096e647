/**
 * Nonlinear least squares: the least of Σ r_i(θ)² over θ, residuals already divided by their standard deviation where
 * these differ. One shape of problem and of answer for every fit of the library that is not a special case.
 */
export interface NonlinearProblem {
  /** Number of residuals, m. */
  readonly residuals: number;
  /** Number of parameters, n ≤ m. */
  readonly parameters: number;
  /**
   * Writes r(θ), and ∂r_i/∂θ_j into `jacobian[j][i]` unless `jacobian` is null. Returns false where the model has no
   * finite value; the fit then steps back. Nothing is allocated.
   */
  evaluate(theta: Float64Array, residuals: Float64Array, jacobian: readonly Float64Array[] | null): boolean;
  /** Inclusive bounds a parameter, ±Infinity where there is none; free where absent. */
  readonly bounds?: readonly (readonly [number, number])[];
}

export interface NonlinearOptions {
  /** Evaluations of the residuals after which the fit gives up; default 2000. */
  readonly mostEvaluations?: number;
  /** Asked between steps; true ends the fit with status "stopped". */
  readonly shouldStop?: () => boolean;
}

export interface NonlinearSolution {
  readonly parameters: Float64Array;
  readonly residuals: Float64Array;
  readonly residualSquares: number;
  readonly degreesOfFreedom: number;
  /** √(RSS/(m − n)), n without fixed parameters; null with no degree of freedom. */
  readonly residualStandardDeviation: number | null;
  /**
   * (JᵀJ)⁻¹ at the solution, n by n in rows, without the residual variance; zeros for a parameter that its bounds fix
   * (low = high), which is not counted as a parameter either. Null where J has not full rank.
   */
  readonly unscaledCovariance: readonly (readonly number[])[] | null;
  /** Numerical rank of the column-scaled Jacobian. */
  readonly rank: number;
  /** Whether each parameter rests on a bound. */
  readonly held: readonly boolean[];
  readonly steps: number;
  readonly evaluations: number;
}

export type NonlinearFit =
  | ({ readonly status: "converged" } & NonlinearSolution)
  /** The best point reached; not to be reported as a fit. */
  | ({ readonly status: "not-converged" | "stopped"; readonly message: string } & NonlinearSolution)
  | { readonly status: "no-value-at-start" | "too-few-points" | "bad-start"; readonly message: string };
