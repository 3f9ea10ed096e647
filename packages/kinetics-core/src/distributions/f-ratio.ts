import { incompleteBeta } from "./incomplete-beta";
import type { Tails } from "./incomplete-gamma";
import { logBetaKernel } from "./stirling-error";
import { assertDegreesOfFreedom, assertProbability, tailQuantile } from "./tail-quantile";

/** The F distribution of a ratio of mean squares with ν₁ (above) and ν₂ (below) degrees of freedom. */

export function fCdf(ratio: number, above: number, below: number): number {
  return ratioTails(ratio, above, below).lower;
}

/** P(F > ratio): the p-value of a comparison, with its digits kept far out. */
export function fSurvival(ratio: number, above: number, below: number): number {
  return ratioTails(ratio, above, below).upper;
}

/** Ratio with P(F ≤ ratio) = p. */
export function fQuantile(p: number, above: number, below: number): number {
  assertProbability(p, "fQuantile");
  assertDegreesOfFreedom(above, "fQuantile");
  assertDegreesOfFreedom(below, "fQuantile");
  if (p === 0) return 0;
  if (p === 1) return Number.POSITIVE_INFINITY;
  return tailQuantile(
    { lower: p, upper: 1 - p },
    (ratio) => ratioTails(ratio, above, below),
    (ratio) => {
      const { x, y } = betaArgument(ratio, above, below);
      return Math.exp(logBetaKernel(above / 2, below / 2, x, y)) / ratio;
    },
    1,
  );
}

function ratioTails(ratio: number, above: number, below: number): Tails {
  assertDegreesOfFreedom(above, "the F distribution");
  assertDegreesOfFreedom(below, "the F distribution");
  if (ratio <= 0) return { lower: 0, upper: 1 };
  if (ratio === Number.POSITIVE_INFINITY) return { lower: 1, upper: 0 };
  const { x, y } = betaArgument(ratio, above, below);
  return incompleteBeta(above / 2, below / 2, x, y);
}

function betaArgument(ratio: number, above: number, below: number): { x: number; y: number } {
  const odds = (above * ratio) / below;
  return odds > 1
    ? { x: 1 / (1 + 1 / odds), y: 1 / odds / (1 + 1 / odds) }
    : { x: odds / (1 + odds), y: 1 / (1 + odds) };
}
