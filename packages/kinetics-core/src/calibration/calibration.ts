import type { Estimate } from "kinetics-core/quantities";

/**
 * The shapes of a calibration line, signal = intercept + slope · concentration. Concentrations and signals carry
 * whatever units the caller has; every answer is in the same ones.
 */

export interface CalibrationInput {
  /** Of the standards; replicates of a level stand as points of their own. */
  readonly concentrations: readonly number[];
  /** One for each concentration. */
  readonly signals: readonly number[];
  /** Proportional to 1/variance of each signal, > 0; all equal where absent. */
  readonly weights?: readonly number[];
  /** Default "fitted". "none": the line goes through (0, 0). */
  readonly intercept?: "fitted" | "none";
  /** Confidence level of every interval, default 0.95. */
  readonly level?: number;
}

export interface CalibrateInput extends CalibrationInput {
  /** Replicate signals of each unknown. */
  readonly readings?: readonly (readonly number[])[];
  /** Of one signal of each unknown, on the scale of `weights`; 1 where absent. */
  readonly readingWeights?: readonly number[];
}

export interface Standard {
  readonly concentration: number;
  readonly signal: number;
  readonly weight: number;
  /** Signal less the line. */
  readonly residual: number;
  /** Share that this standard has in its own fitted value, 0 to 1. */
  readonly leverage: number;
}

/**
 * A straight line by least squares. About its centre, the weighted mean of the standards, level and slope are
 * uncorrelated, so that at concentration x
 *
 *   signal = ȳ + b (x − x̄),   u² = s² (1/W + (x − x̄)²/S_xx),   W = Σw,   S_xx = Σw (x − x̄)².
 *
 * Through the origin x̄ = ȳ = 0 and 1/W counts as 0.
 */
export interface CalibrationLine {
  readonly status: "fitted";
  readonly interceptFitted: boolean;
  readonly slope: Estimate;
  /** 0 without uncertainty where the line goes through the origin. */
  readonly intercept: Estimate;
  /** Of intercept and slope; null where there is no uncertainty or no intercept. */
  readonly covariance: number | null;
  /** Of intercept and slope, −1 to 1. */
  readonly correlation: number | null;
  /** √(Σ w r²/ν), that of a signal of weight 1; null with no degree of freedom. */
  readonly residualStandardDeviation: number | null;
  readonly degreesOfFreedom: number;
  /**
   * Share of the weighted sum of squares of the signals that the line carries: about their mean, or about zero where
   * the line goes through the origin (as NIST's certified values have it). Null where all signals are equal.
   */
  readonly rSquared: number | null;
  /** The standards obey the line to rounding: nothing can be learnt from their residuals. */
  readonly exact: boolean;
  readonly level: number;
  readonly centre: { readonly concentration: number; readonly signal: number };
  /** 1/W, or 0 through the origin. */
  readonly inverseWeight: number;
  /** 1/S_xx. */
  readonly inverseSpread: number;
  readonly standards: readonly Standard[];
}

/** Which argument cannot be used, and where in it; `index` is null where it is the argument as a whole. */
export interface CalibrationFault {
  readonly status: "lengths-differ" | "not-finite" | "bad-weight" | "too-few-standards" | "beyond-precision";
  readonly argument: "concentrations" | "signals" | "weights";
  readonly index: number | null;
  readonly message: string;
}
