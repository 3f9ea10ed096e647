import { incompleteBeta } from "./incomplete-beta";
import type { Tails } from "./incomplete-gamma";
import { normalCdf, normalQuantile, normalSurvival } from "./normal";
import { logBetaKernel } from "./stirling-error";
import { assertDegreesOfFreedom, assertProbability, tailQuantile } from "./tail-quantile";

/** Student's t with any degrees of freedom above 0, whole or not; `Infinity` is the normal distribution. */

/** P(T ≤ t). */
export function studentTCdf(t: number, degreesOfFreedom: number): number {
  return studentTails(t, degreesOfFreedom).lower;
}

/** P(T > t), with its digits kept far out; a two-sided p-value is twice this at |t|. */
export function studentTSurvival(t: number, degreesOfFreedom: number): number {
  return studentTails(t, degreesOfFreedom).upper;
}

/** t with P(T ≤ t) = p; ∓∞ at 0 and 1. */
export function studentTQuantile(p: number, degreesOfFreedom: number): number {
  assertProbability(p, "studentTQuantile");
  assertDegreesOfFreedom(degreesOfFreedom, "studentTQuantile");
  if (p === 0) return Number.NEGATIVE_INFINITY;
  if (p === 1) return Number.POSITIVE_INFINITY;
  if (p === 0.5) return 0;
  if (degreesOfFreedom > NEARLY_NORMAL) return quantileNearNormal(normalQuantile(p), degreesOfFreedom);
  const outer = Math.min(p, 1 - p);
  const magnitude = tailQuantile(
    { lower: 1 - 2 * outer, upper: 2 * outer },
    (t) => magnitudeTails(t, degreesOfFreedom),
    (t) => densityOfMagnitude(t, degreesOfFreedom),
    1,
  );
  return p < 0.5 ? -magnitude : magnitude;
}

/**
 * Above so many degrees of freedom the incomplete beta function loses digits (5 of them at 10⁸, all at 10¹⁶), while the series in
 * 1/ν about the normal distribution has more than a double holds. Welch's formula reaches such numbers where one
 * part of a variance is rounding.
 */
const NEARLY_NORMAL = 1e6;

/** t = z + (z³ + z)/4ν + (5z⁵ + 16z³ + 3z)/96ν² (Abramowitz and Stegun 26.7.5). */
function quantileNearNormal(z: number, degreesOfFreedom: number): number {
  const part = 1 / degreesOfFreedom;
  const square = z * z;
  return z * (1 + part * ((square + 1) / 4 + (part * ((5 * square + 16) * square + 3)) / 96));
}

/** z = t − (t³ + t)/4ν + (13t⁵ + 8t³ + 3t)/96ν²: the same series turned round, for t² well below ν. */
function deviateNearNormal(t: number, degreesOfFreedom: number): number {
  const part = 1 / degreesOfFreedom;
  const square = t * t;
  // From forty standard deviations on nothing is left of either tail.
  if (square > FARTHEST_SQUARE) return t;
  return t * (1 - part * ((square + 1) / 4 - (part * ((13 * square + 8) * square + 3)) / 96));
}

const FARTHEST_SQUARE = 1600;

/** Half-width of a two-sided interval in standard errors: t with P(|T| ≤ t) = level. */
export function studentTFactor(level: number, degreesOfFreedom: number): number {
  if (level !== last.level || degreesOfFreedom !== last.degreesOfFreedom) {
    last = { level, degreesOfFreedom, factor: studentTQuantile(0.5 + level / 2, degreesOfFreedom) };
  }
  return last.factor;
}

/** A table asks for the same factor row after row, and its search costs more than the row: the last one is kept. */
let last = { level: Number.NaN, degreesOfFreedom: Number.NaN, factor: Number.NaN };

function studentTails(t: number, degreesOfFreedom: number): Tails {
  assertDegreesOfFreedom(degreesOfFreedom, "Student's t");
  if (degreesOfFreedom > NEARLY_NORMAL) {
    const z = deviateNearNormal(t, degreesOfFreedom);
    return { lower: normalCdf(z), upper: normalSurvival(z) };
  }
  const both = magnitudeTails(Math.abs(t), degreesOfFreedom);
  const outer = 0.5 * both.upper;
  const inner = 0.5 + 0.5 * both.lower;
  return t >= 0 ? { lower: inner, upper: outer } : { lower: outer, upper: inner };
}

/** Of |T|: P(|T| ≤ t) = I_x(½, ν/2) at x = t²/(ν + t²). */
function magnitudeTails(t: number, degreesOfFreedom: number): Tails {
  const { x, y } = betaArgument(t, degreesOfFreedom);
  return incompleteBeta(0.5, degreesOfFreedom / 2, x, y);
}

function betaArgument(t: number, degreesOfFreedom: number): { x: number; y: number } {
  const ratio = (t / degreesOfFreedom) * t;
  return ratio > 1
    ? { x: 1 / (1 + 1 / ratio), y: 1 / ratio / (1 + 1 / ratio) }
    : { x: ratio / (1 + ratio), y: 1 / (1 + ratio) };
}

/** Density of |T| at t > 0: with x = t²/(ν + t²), dx/dt = 2x(1 − x)/t cancels the kernel's 1/(x(1 − x)). */
function densityOfMagnitude(t: number, degreesOfFreedom: number): number {
  const { x, y } = betaArgument(t, degreesOfFreedom);
  return (2 / t) * Math.exp(logBetaKernel(0.5, degreesOfFreedom / 2, x, y));
}
