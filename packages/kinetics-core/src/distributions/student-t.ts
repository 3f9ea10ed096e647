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
  if (degreesOfFreedom === Number.POSITIVE_INFINITY) return normalQuantile(p);
  const outer = Math.min(p, 1 - p);
  const magnitude = tailQuantile(
    { lower: 1 - 2 * outer, upper: 2 * outer },
    (t) => magnitudeTails(t, degreesOfFreedom),
    (t) => densityOfMagnitude(t, degreesOfFreedom),
    1,
  );
  return p < 0.5 ? -magnitude : magnitude;
}

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
  if (degreesOfFreedom === Number.POSITIVE_INFINITY) return { lower: normalCdf(t), upper: normalSurvival(t) };
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
