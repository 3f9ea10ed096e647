import { informationProblem } from "./information-problem";
import type { InferenceFailure } from "./random-rate-inference";
import type { PriorInformation, RunInformation } from "./run-information";
import { partsOf } from "./run-parts";

/**
 * The marginal quadratic form rᵀV⁻¹r at fixed σ_j and τ, parted: what the runs' own ln k depart from the law on the
 * level of runs, and what the law misses of their shape whatever their ln k. Laws that need traces are compared by
 * these, with σ_j and τ from one fit for all of them.
 */
export interface MarginalSquares {
  readonly status: "determined";
  /** Σ z_j²/(h_j + τ²) and the priors' (deviation/u)²: about the number of runs for a law that holds. */
  readonly betweenRuns: number;
  /** Σ (rᵀr − a z²)/σ_j²: about the number of independent readings for a law that holds. */
  readonly shape: number;
  /** z_j, the run's own ln k less the law's, and 1/(h_j + τ²); null where the run says nothing about ln k. */
  readonly runs: readonly { readonly residual: number; readonly weight: number }[] | null;
}

/** `runs`, `priors`: at the law's own optimum. */
export function marginalSquares(
  runs: readonly RunInformation[],
  priors: readonly PriorInformation[],
  held: { readonly noiseVariances: readonly number[]; readonly betweenRunVariance: number },
): MarginalSquares | InferenceFailure {
  const problem = informationProblem(runs, priors, { ...held, undetermined: 1 });
  if (problem !== null) return problem;
  let betweenRuns = priors.reduce(
    (sum, { deviation, standardUncertainty }) => sum + (deviation / standardUncertainty) ** 2,
    0,
  );
  let shape = 0;
  const levels: { residual: number; weight: number }[] = [];
  for (const { ownVariance, offset, shapeQuadratic } of partsOf(runs, held.noiseVariances)) {
    shape += shapeQuadratic;
    if (ownVariance === null) continue;
    const weight = 1 / (ownVariance + held.betweenRunVariance);
    betweenRuns += weight * offset ** 2;
    levels.push({ residual: offset, weight });
  }
  return { status: "determined", betweenRuns, shape, runs: levels.length === runs.length ? levels : null };
}
