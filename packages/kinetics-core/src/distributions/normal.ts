import { incompleteGamma, type Tails } from "./incomplete-gamma";
import { assertProbability, tailQuantile } from "./tail-quantile";

/** Standard normal density. */
function normalDensity(z: number): number {
  return Math.exp(-0.5 * z * z) / Math.sqrt(2 * Math.PI);
}

/** P(Z ≤ z). */
export function normalCdf(z: number): number {
  return normalTails(z).lower;
}

/** P(Z > z), with its digits kept far out. */
export function normalSurvival(z: number): number {
  return normalTails(z).upper;
}

function normalTails(z: number): Tails {
  const twoSided = incompleteGamma(0.5, 0.5 * z * z);
  const outer = 0.5 * twoSided.upper;
  const inner = 0.5 + 0.5 * twoSided.lower;
  return z >= 0 ? { lower: inner, upper: outer } : { lower: outer, upper: inner };
}

/** z with P(Z ≤ z) = p; ∓∞ at 0 and 1. */
export function normalQuantile(p: number): number {
  assertProbability(p, "normalQuantile");
  if (p === 0) return Number.NEGATIVE_INFINITY;
  if (p === 1) return Number.POSITIVE_INFINITY;
  if (p === 0.5) return 0;
  const outer = Math.min(p, 1 - p);
  const magnitude = tailQuantile(
    { lower: 1 - 2 * outer, upper: 2 * outer },
    (z) => incompleteGamma(0.5, 0.5 * z * z),
    (z) => 2 * normalDensity(z),
    1,
  );
  return p < 0.5 ? -magnitude : magnitude;
}
