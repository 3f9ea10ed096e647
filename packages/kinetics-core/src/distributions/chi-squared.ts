import { incompleteGamma } from "./incomplete-gamma";
import { logPoissonDensity } from "./stirling-error";
import { assertDegreesOfFreedom, assertProbability, tailQuantile } from "./tail-quantile";

/** χ² with any degrees of freedom above 0. */

export function chiSquaredCdf(x: number, degreesOfFreedom: number): number {
  assertDegreesOfFreedom(degreesOfFreedom, "chiSquaredCdf");
  return x <= 0 ? 0 : incompleteGamma(degreesOfFreedom / 2, x / 2).lower;
}

/** P(χ² > x), with its digits kept far out. */
export function chiSquaredSurvival(x: number, degreesOfFreedom: number): number {
  assertDegreesOfFreedom(degreesOfFreedom, "chiSquaredSurvival");
  return x <= 0 ? 1 : incompleteGamma(degreesOfFreedom / 2, x / 2).upper;
}

/** x with P(χ² ≤ x) = p. */
export function chiSquaredQuantile(p: number, degreesOfFreedom: number): number {
  assertProbability(p, "chiSquaredQuantile");
  assertDegreesOfFreedom(degreesOfFreedom, "chiSquaredQuantile");
  if (p === 0) return 0;
  if (p === 1) return Number.POSITIVE_INFINITY;
  const a = degreesOfFreedom / 2;
  return tailQuantile(
    { lower: p, upper: 1 - p },
    (x) => incompleteGamma(a, x / 2),
    // x^(a−1) e^(−x/2) / (2^a Γ(a)) = a · Poisson(a; x/2) / x
    (x) => (a / x) * Math.exp(logPoissonDensity(a, x / 2)),
    degreesOfFreedom,
  );
}
