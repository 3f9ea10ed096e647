import { LEAST_FREEDOM_LEFT } from "./constants";
import { bilinear, factorisePositive, timesVector } from "./positive-definite";
import type { PriorInformation } from "./run-information";
import type { RunParts } from "./run-parts";

/** The linearised model of all runs at one τ²: estimates by generalised least squares and what REML needs of it. */
export interface MarginalFit {
  readonly status: "fitted";
  /** δ, the generalised least squares step in θ. */
  readonly step: Float64Array;
  /** (Σ JᵀV⁻¹J + priors)⁻¹, p by p, row after row. */
  readonly covariance: Float64Array;
  /** rᵀV⁻¹r of runs and priors after the step. */
  readonly quadratic: number;
  /** ln|V| + rᵀV⁻¹r after the step, but for a constant of the noise variances. */
  readonly marginalDeviance: number;
  /** `marginalDeviance` + ln|Σ JᵀV⁻¹J + priors|. */
  readonly restrictedDeviance: number;
}

export type MarginalResult = MarginalFit | { readonly status: "undetermined"; readonly parameter: number };

/** Parts of the sum over runs and priors that do not change with τ². */
export interface FixedParts {
  readonly parameters: number;
  readonly information: Float64Array;
  readonly gradient: Float64Array;
  readonly quadratic: number;
  readonly priorLogDeterminant: number;
}

export function fixedParts(parts: readonly RunParts[], priors: readonly PriorInformation[]): FixedParts {
  const p = parts[0]?.direction.length ?? 0;
  const information = new Float64Array(p * p);
  const gradient = new Float64Array(p);
  let quadratic = 0;
  let priorLogDeterminant = 0;
  for (const part of parts) {
    for (let i = 0; i < p * p; i++) information[i] = (information[i] ?? 0) + (part.shapeInformation[i] ?? 0);
    for (let i = 0; i < p; i++) gradient[i] = (gradient[i] ?? 0) + (part.shapeGradient[i] ?? 0);
    quadratic += part.shapeQuadratic;
  }
  for (const { parameter, deviation, standardUncertainty } of priors) {
    const weight = 1 / standardUncertainty ** 2;
    const place = parameter * p + parameter;
    information[place] = (information[place] ?? 0) + weight;
    gradient[parameter] = (gradient[parameter] ?? 0) + weight * deviation;
    quadratic += weight * deviation ** 2;
    priorLogDeterminant -= Math.log(weight);
  }
  return { parameters: p, information, gradient, quadratic, priorLogDeterminant };
}

export function marginalFit(
  parts: readonly RunParts[],
  fixed: FixedParts,
  betweenRunVariance: number,
): MarginalResult {
  const p = fixed.parameters;
  const information = fixed.information.slice();
  const gradient = fixed.gradient.slice();
  let quadraticBefore = fixed.quadratic;
  let logDeterminant = fixed.priorLogDeterminant;
  for (const { ownVariance, direction, offset } of parts) {
    if (ownVariance === null) continue;
    const weight = 1 / (ownVariance + betweenRunVariance);
    for (let i = 0; i < p; i++) {
      const weighted = weight * (direction[i] ?? 0);
      gradient[i] = (gradient[i] ?? 0) + weighted * offset;
      for (let j = 0; j < p; j++)
        information[i * p + j] = (information[i * p + j] ?? 0) + weighted * (direction[j] ?? 0);
    }
    quadraticBefore += weight * offset ** 2;
    logDeterminant += Math.log1p(betweenRunVariance / ownVariance);
  }
  const factors = factorisePositive(information, p);
  if (factors.status === "deficient") return { status: "undetermined", parameter: factors.parameter };
  const step = timesVector(factors.inverse, gradient, p);
  let explained = 0;
  for (let i = 0; i < p; i++) explained += (step[i] ?? 0) * (gradient[i] ?? 0);
  const quadratic = Math.max(0, quadraticBefore - explained);
  const marginalDeviance = logDeterminant + quadratic;
  return {
    status: "fitted",
    step,
    covariance: factors.inverse,
    quadratic,
    marginalDeviance,
    restrictedDeviance: marginalDeviance + factors.logDeterminant,
  };
}

/**
 * Derivative of the restricted deviance by τ²:
 *     Σ_j 1/(h_j + τ²) − (u_jᵀ C u_j + (z_j − u_jᵀδ)²)/(h_j + τ²)²,   C the covariance, δ the step.
 */
export function slopeByVariance(
  parts: readonly RunParts[],
  fit: MarginalFit,
  betweenRunVariance: number,
): number {
  const p = fit.step.length;
  let slope = 0;
  for (const part of parts) {
    if (part.ownVariance === null) continue;
    const weight = 1 / (part.ownVariance + betweenRunVariance);
    const spread =
      bilinear(part.direction, fit.covariance, part.direction, p) + offsetAfter(part, fit.step) ** 2;
    slope += weight - weight ** 2 * spread;
  }
  return slope;
}

/** z − uᵀδ: by how much the run's own ln k departs from the fitted one. */
export function offsetAfter(part: RunParts, step: Float64Array): number {
  let offset = part.offset;
  for (let i = 0; i < step.length; i++) offset -= (part.direction[i] ?? 0) * (step[i] ?? 0);
  return offset;
}

/**
 * s² of the runs about the law: Σ (z − uᵀδ)²/(h + variance) over its expectation where h + variance is right,
 * Σ 1 − uᵀC u/(h + variance). That expectation is m less what the runs spent on parameters, whole or in part: a
 * parameter that the shape of the runs determines as well costs less than one. 1 where nothing is left.
 */
export function runScaleOf(parts: readonly RunParts[], fit: MarginalFit, betweenRunVariance: number): number {
  const p = fit.step.length;
  let squares = 0;
  let expected = 0;
  for (const part of parts) {
    if (part.ownVariance === null) continue;
    const weight = 1 / (part.ownVariance + betweenRunVariance);
    squares += weight * offsetAfter(part, fit.step) ** 2;
    expected += 1 - weight * bilinear(part.direction, fit.covariance, part.direction, p);
  }
  return expected > LEAST_FREEDOM_LEFT ? squares / expected : 1;
}

/**
 * C (Σ S/σ² + priors + Σ w² v u uᵀ) C with w = 1/(h + f), the weights of the fit, and v what the run's ln k varies by:
 * C itself where v = h + f.
 */
export function sandwichedCovariance(
  parts: readonly RunParts[],
  fit: MarginalFit,
  weightVariance: number,
  varianceOf: (ownVariance: number) => number,
): Float64Array {
  const p = fit.step.length;
  const covariance = fit.covariance.slice();
  for (const { ownVariance, direction } of parts) {
    if (ownVariance === null) continue;
    const weight = 1 / (ownVariance + weightVariance);
    const excess = weight * (weight * varianceOf(ownVariance) - 1);
    if (excess === 0) continue;
    const effect = timesVector(fit.covariance, direction, p);
    for (let i = 0; i < p; i++)
      for (let j = 0; j < p; j++)
        covariance[i * p + j] = (covariance[i * p + j] ?? 0) + excess * (effect[i] ?? 0) * (effect[j] ?? 0);
  }
  return covariance;
}
