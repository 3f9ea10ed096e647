import { quadraticForm, stepCorrelations } from "kinetics-core/initial-rate";
import { dot } from "kinetics-core/linear-algebra";

/**
 * Noise of a trace from the residuals r of a fit that spans the orthonormal basis Q, as the initial-rate rule has it
 * for a polynomial: with r₁ the lag-one autocorrelation and q = tr QᵀQ on the readings,
 *
 *   ρ = clip((n·r₁ + q)/(n − q − 2), 0, 0.97),   σ² = rᵀr/(n − tr QᵀR(ρ)Q),   N_eff = n(1 − ρ)/(1 + ρ).
 *
 * Degrees of freedom are N_eff − q, and 3 where a strong correlation leaves fewer.
 */
export interface CourseNoise {
  /** σ of one reading, on the scale of the residuals; 0 without a degree of freedom. */
  readonly standardDeviation: number;
  readonly autocorrelation: number;
  readonly effectivePoints: number;
  /** 0 where the fit goes through all readings. */
  readonly degreesOfFreedom: number;
  /** Correlation of each reading with the one before it. */
  readonly steps: Float64Array;
}

/**
 * Under this many readings an autocorrelation is the fit's own doing: its estimate scatters by a third and more. Such
 * traces come from samples that were taken by hand, each with an error of its own.
 */
const LEAST_CORRELATED_READINGS = 20;
/** At 1 the variance of any estimate has no bound. As in the initial-rate rule. */
const LARGEST_AUTOCORRELATION = 0.97;
/** As in the initial-rate rule: ρ is underestimated in short traces, and this floor stands for that. */
const LEAST_CORRELATED_FREEDOM = 3;
/** A residual collects about this many roundings; what is below says nothing of a correlation. */
const ROUNDINGS = 8;

/**
 * `residuals` and every column of `basis`: one entry a reading, or more (rows that are no readings come last).
 * `rounding`: the least σ, since readings are doubles and exact numbers leave nothing but the rounding of the fit.
 */
export function courseNoise(
  time: Float64Array,
  residuals: Float64Array,
  basis: readonly Float64Array[],
  rounding: number,
): CourseNoise {
  const n = time.length;
  const own = residuals.subarray(0, n);
  const columns = basis.map((column) => column.subarray(0, n));
  const taken = columns.reduce((sum, column) => sum + dot(column, column), 0);
  const squares = dot(own, own);
  const exact = squares <= n * (ROUNDINGS * rounding) ** 2;
  const autocorrelation = exact ? 0 : autocorrelationOf(own, squares, taken);
  const steps = stepCorrelations(time, autocorrelation);
  const spent =
    autocorrelation === 0 ? taken : columns.reduce((sum, column) => sum + quadraticForm(column, steps, 0), 0);
  const effectivePoints = (n * (1 - autocorrelation)) / (1 + autocorrelation);
  // Leverages add up to a whole number in exact arithmetic.
  const left = n - taken < 1e-6 ? 0 : n - taken;
  const floor = Math.min(left, LEAST_CORRELATED_FREEDOM);
  return {
    standardDeviation:
      left === 0 ? 0 : Math.max(Math.sqrt(squares / Math.max(n - spent, left / n)), rounding),
    autocorrelation,
    effectivePoints,
    degreesOfFreedom: left === 0 ? 0 : Math.max(effectivePoints - taken, floor),
    steps,
  };
}

function autocorrelationOf(residuals: Float64Array, squares: number, taken: number): number {
  const n = residuals.length;
  if (n < LEAST_CORRELATED_READINGS) return 0;
  let lagged = 0;
  for (let i = 1; i < n; i++) lagged += (residuals[i] ?? 0) * (residuals[i - 1] ?? 0);
  const estimated = ((n * lagged) / squares + taken) / (n - taken - 2);
  return Math.min(Math.max(estimated, 0), LARGEST_AUTOCORRELATION);
}

/** Standard deviation of a mean of correlated readings over that of one reading, times √n: √((1 + ρ)/(1 − ρ)). */
export function correlationInflation(autocorrelation: number): number {
  return Math.sqrt((1 + autocorrelation) / (1 - autocorrelation));
}
