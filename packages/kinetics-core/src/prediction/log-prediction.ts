import { studentTFactor } from "kinetics-core/distributions";
import { dot } from "kinetics-core/linear-algebra";
import { type Estimate, estimateOf, exponentialOf, noEstimate } from "kinetics-core/quantities";
import type { FittedLaw } from "./fitted-law";

/**
 * A logarithm predicted by the law: ln y = h(ln k, θ) with gradient d, so that Var ln y = dᵀ Σ d, and for one new run
 * + τ² more, since a run's own ln k departs from the law's by τ. d is exact in ln k; in θ it is the first order.
 */
export interface LogPrediction {
  readonly logarithm: number;
  /** Of the law; null where it gives no uncertainty. */
  readonly variance: number | null;
  /** With τ²; null where τ is not known. */
  readonly newRunVariance: number | null;
}

/** `gradient`: by ln k, then by each parameter. `scatterFactor`: how far the logarithm moves with ln k, ±1 mostly. */
export function logPrediction(
  law: FittedLaw,
  logarithm: number,
  gradient: ArrayLike<number>,
  scatterFactor = 1,
): LogPrediction {
  const { covariance, betweenRunStandardDeviation: between } = law;
  if (covariance === null) return { logarithm, variance: null, newRunVariance: null };
  const columns = covariance.map((row) => dot(gradient, row));
  const variance = Math.max(0, dot(columns, gradient));
  return {
    logarithm,
    variance,
    newRunVariance: between === null ? null : variance + (scatterFactor * between) ** 2,
  };
}

/** The quantity with its interval back-transformed from the logarithm; no interval without degrees of freedom. */
export function estimateOfLogarithm(law: FittedLaw, logarithm: number, variance: number | null): Estimate {
  const deviation = variance === null ? null : Math.sqrt(variance);
  return exponentialOf(estimateOf(logarithm, deviation, law.degreesOfFreedom, law.level));
}

/** Of the law and of one new run; the latter says nothing where τ is unknown. */
export function bothEstimates(
  law: FittedLaw,
  { logarithm, variance, newRunVariance }: LogPrediction,
): { readonly ofTheLaw: Estimate; readonly newRun: Estimate } {
  return {
    ofTheLaw: estimateOfLogarithm(law, logarithm, variance),
    newRun:
      newRunVariance === null ? noEstimate(law.level) : estimateOfLogarithm(law, logarithm, newRunVariance),
  };
}

/** Two-sided factor of the law's intervals; null where there is none. */
export function factorOf(law: FittedLaw): number | null {
  const { degreesOfFreedom } = law;
  return degreesOfFreedom === null || !(degreesOfFreedom > 0)
    ? null
    : studentTFactor(law.level, degreesOfFreedom);
}
