import { orthonormalPolynomials, projectOn } from "kinetics-core/least-squares";
import { quadraticForm, stepCorrelations } from "./autoregressive-noise";
import {
  LARGEST_AUTOCORRELATION,
  LEAST_DEGREES_OF_FREEDOM,
  LEAST_WINDOW_POINTS,
  NOISE_DEGREE,
  NOISE_DEGREES_SPENT,
} from "./constants";
import type { Trace } from "./initial-rate";
import { type Readings, type RefusedTrace, readingsOf } from "./readings";

/** What the residuals of a smooth curve say about the noise of a trace. */
export interface TraceNoise {
  /** σ, standard deviation of one reading, in signal. Never less than the rounding of a double. */
  readonly standardDeviation: number;
  /** ρ, correlation of neighbouring readings at the median spacing, 0 … 0.97. */
  readonly autocorrelation: number;
  /** N_eff = n(1 − ρ)/(1 + ρ). */
  readonly effectivePoints: number;
  /** Degrees of freedom of σ for an interval. */
  readonly degreesOfFreedom: number;
  /** Degree of the polynomial that stood for the signal. */
  readonly degree: number;
}

/** The noise together with what variances of linear estimators need: R by its steps. */
export interface NoiseModel extends TraceNoise {
  /** φ_i of `stepCorrelations`, one per reading. */
  readonly steps: Float64Array;
  /** Half the spacing of doubles at the largest signal, the least that a reading can be uncertain by. */
  readonly roundingError: number;
}

/**
 * Noise of a trace from all its readings at or after `timeZero`; at least 8 of them are needed for an
 * autocorrelation, with 4 to 7 the residuals of a quadratic are taken as independent. Refuses what `readingsOf`
 * refuses, and answers `too-few-points` below 4.
 */
export function traceNoise(
  trace: Trace,
  timeZero = 0,
):
  | ({ readonly status: "found" } & TraceNoise)
  | RefusedTrace
  | { readonly status: "too-few-points"; readonly needed: number; readonly got: number } {
  const readings = readingsOf(trace, timeZero);
  if (readings.status !== "usable") return readings;
  const got = readings.time.length;
  if (got < 4) return { status: "too-few-points", needed: 4, got };
  const { standardDeviation, autocorrelation, effectivePoints, degreesOfFreedom, degree } = noiseOf(readings);
  return {
    status: "found",
    standardDeviation,
    autocorrelation,
    effectivePoints,
    degreesOfFreedom,
    degree,
  };
}

/**
 * Residuals of a polynomial of degree d = min(6, ⌊n/4⌋ − 1) with q = d + 1 coefficients on an orthonormal basis
 * Q, over all n readings. With r₁ their lag-one autocorrelation,
 *
 *   ρ = clip((n r₁ + q)/(n − q − 2), 0, 0.97)        (the fit itself makes residuals anticorrelated)
 *   σ² = RSS/(n − tr QᵀR(ρ)Q)                        (it takes up more variance the more they are correlated)
 *   df = max(n(1 − ρ)/(1 + ρ) − 5, 3).
 *
 * Under 8 readings that polynomial would be a constant, and the reaction itself would pass for noise: a
 * quadratic stands for the signal instead, ρ is taken as 0 and the degrees of freedom are n − 3.
 * `readings`: at least 4.
 */
export function noiseOf(readings: Readings): NoiseModel {
  const { time, signal } = readings;
  const n = time.length;
  const short = n < LEAST_WINDOW_POINTS;
  const degree = short ? 2 : Math.min(NOISE_DEGREE, Math.floor(n / 4) - 1);
  const coefficients = degree + 1;
  const basis = orthonormalPolynomials(time, 0, n, degree);
  const projections = projectOn(basis, signal, 0);

  let squares = 0;
  let lagged = 0;
  let largest = 0;
  let before = 0;
  for (let i = 0; i < n; i++) {
    const value = signal[i] ?? Number.NaN;
    let residual = value;
    for (let j = 0; j < coefficients; j++) {
      residual -= (projections[j] ?? Number.NaN) * (basis.columns[j * n + i] ?? Number.NaN);
    }
    squares += residual * residual;
    lagged += i === 0 ? 0 : residual * before;
    before = residual;
    largest = Math.max(largest, Math.abs(value));
  }

  const roundingError = (Number.EPSILON / 2) * (largest || 1);
  // What is left of exact numbers is the rounding of this very fit, and no noise to be correlated.
  const exact = squares <= n * (ROUNDINGS * roundingError) ** 2;
  const estimated = ((n * lagged) / squares + coefficients) / (n - coefficients - 2);
  const autocorrelation = short || exact ? 0 : Math.min(Math.max(estimated, 0), LARGEST_AUTOCORRELATION);
  const steps = stepCorrelations(time, autocorrelation);
  let taken = 0;
  for (let j = 0; j < coefficients; j++) {
    taken += quadraticForm(basis.columns.subarray(j * n, (j + 1) * n), steps, 0);
  }
  const effectivePoints = (n * (1 - autocorrelation)) / (1 + autocorrelation);
  return {
    standardDeviation: Math.max(Math.sqrt(squares / (n - taken)), roundingError),
    autocorrelation,
    effectivePoints,
    degreesOfFreedom: short
      ? n - coefficients
      : Math.max(effectivePoints - NOISE_DEGREES_SPENT, LEAST_DEGREES_OF_FREEDOM),
    degree,
    steps,
    roundingError,
  };
}

/** A residual of a fit with seven terms collects about this many roundings. */
const ROUNDINGS = 8;
