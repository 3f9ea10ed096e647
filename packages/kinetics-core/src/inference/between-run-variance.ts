import { leastDeviance } from "./least-deviance";
import {
  type FixedParts,
  type MarginalFit,
  marginalFit,
  offsetAfter,
  slopeByVariance,
} from "./marginal-model";
import type { RunParts } from "./run-parts";

/**
 * τ² by restricted maximum likelihood of the linearised model: the least of
 *     ln|V| + ln|Σ JᵀV⁻¹J + Σ priors| + rᵀV⁻¹r,   τ² ≥ 0
 * (Patterson and Thompson, Biometrika 58, 545, 1971). The value 0 is an answer like any other.
 */
export function betweenRunVariance(parts: readonly RunParts[], fixed: FixedParts): number {
  const pooled = marginalFit(parts, fixed, 0);
  if (pooled.status !== "fitted") return 0;
  const scale = spreadOfOffsets(parts, pooled);
  if (!(scale > 0)) return 0;
  return leastDeviance(
    (variance) => {
      const fit = marginalFit(parts, fixed, variance);
      if (fit.status !== "fitted") return { deviance: Number.POSITIVE_INFINITY, slope: 0 };
      return { deviance: fit.restrictedDeviance, slope: slopeByVariance(parts, fit, variance) };
    },
    scale,
    true,
  );
}

/** Mean square by which the runs' own ln k depart from the pooled fit, each counted by its precision: for a grid. */
function spreadOfOffsets(parts: readonly RunParts[], fit: MarginalFit): number {
  let sum = 0;
  let weights = 0;
  for (const part of parts) {
    if (part.ownVariance === null) continue;
    sum += offsetAfter(part, fit.step) ** 2 / part.ownVariance;
    weights += 1 / part.ownVariance;
  }
  return weights > 0 ? sum / weights : 0;
}
