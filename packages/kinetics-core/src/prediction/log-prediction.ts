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
  /** Of `newRunVariance`; null where there is no interval. */
  readonly newRunDegreesOfFreedom: number | null;
}

/** `gradient`: by ln k, then by each parameter. `scatterFactor`: how far the logarithm moves with ln k, ±1 mostly. */
export function logPrediction(
  law: FittedLaw,
  logarithm: number,
  gradient: ArrayLike<number>,
  scatterFactor = 1,
): LogPrediction {
  const { covariance, betweenRunStandardDeviation: between } = law;
  if (covariance === null)
    return { logarithm, variance: null, newRunVariance: null, newRunDegreesOfFreedom: null };
  const columns = covariance.map((row) => dot(gradient, row));
  const variance = Math.max(0, dot(columns, gradient));
  if (between === null) return { logarithm, variance, newRunVariance: null, newRunDegreesOfFreedom: null };
  const own = (scatterFactor * between) ** 2;
  return {
    logarithm,
    variance,
    newRunVariance: variance + own,
    newRunDegreesOfFreedom: degreesWithScatter(law, variance, own),
  };
}

/**
 * Degrees of freedom of V + τ² by Welch and Satterthwaite (JCGM 100:2008, G.4.1). V has the law's effective ν_V where
 * its scatter alone has ν, so that V√(ν/ν_V) of it is scatter and the rest is stated. That scatter and τ² come from the
 * same residuals and add before they are squared: ν (V + τ²)²/(V√(ν/ν_V) + τ²)².
 */
export function degreesWithScatter(law: FittedLaw, variance: number, own: number): number | null {
  const { degreesOfFreedom: whole, runDegreesOfFreedom: ofRuns = whole } = law;
  if (whole === null || ofRuns === null || !(whole > 0) || !(ofRuns > 0)) return null;
  const scatter = variance * Math.min(1, Math.sqrt(ofRuns / whole)) + own;
  return scatter > 0 ? ofRuns * ((variance + own) / scatter) ** 2 : ofRuns;
}

/** Of the law and of one new run, intervals back-transformed; the latter says nothing where τ is unknown. */
export function bothEstimates(
  { level, degreesOfFreedom }: FittedLaw,
  { logarithm, variance, newRunVariance, newRunDegreesOfFreedom }: LogPrediction,
): { readonly ofTheLaw: Estimate; readonly newRun: Estimate } {
  const estimated = (own: number | null, freedom: number | null) =>
    exponentialOf(estimateOf(logarithm, own === null ? null : Math.sqrt(own), freedom, level));
  return {
    ofTheLaw: estimated(variance, degreesOfFreedom),
    newRun: newRunVariance === null ? noEstimate(level) : estimated(newRunVariance, newRunDegreesOfFreedom),
  };
}

/** Two-sided factor of an interval at the law's level; null where there is none. Remembers the last one. */
export function factors(level: number): (degreesOfFreedom: number | null) => number | null {
  let last = { degreesOfFreedom: Number.NaN, factor: Number.NaN };
  return (degreesOfFreedom) => {
    if (degreesOfFreedom === null || !(degreesOfFreedom > 0)) return null;
    if (degreesOfFreedom !== last.degreesOfFreedom)
      last = { degreesOfFreedom, factor: studentTFactor(level, degreesOfFreedom) };
    return last.factor;
  };
}
