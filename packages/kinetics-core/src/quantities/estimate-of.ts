import { studentTFactor } from "kinetics-core/distributions";
import type { Estimate } from "./estimate";

/**
 * Estimate with its two-sided interval by Student's t; degrees of freedom of `Infinity` give the normal interval.
 * Where the standard error or the degrees of freedom are missing (null, not above 0, not finite) the estimate stands
 * alone: no uncertainty is made up.
 */
export function estimateOf(
  estimate: number,
  standardError: number | null,
  degreesOfFreedom: number | null,
  level = 0.95,
): Estimate {
  if (!Number.isFinite(estimate)) return noEstimate(level);
  if (
    standardError === null ||
    !Number.isFinite(standardError) ||
    degreesOfFreedom === null ||
    !(degreesOfFreedom > 0)
  )
    return { estimate, standardError: null, interval: null, level };
  const halfWidth = standardError === 0 ? 0 : standardError * factorOf(level, degreesOfFreedom);
  return { estimate, standardError, interval: [estimate - halfWidth, estimate + halfWidth], level };
}

let lastLevel = Number.NaN;
let lastFreedom = Number.NaN;
let lastFactor = Number.NaN;

/** Estimates come in rows with one level and one freedom; a quantile costs more than all the rest of a row. */
function factorOf(level: number, degreesOfFreedom: number): number {
  if (level !== lastLevel || degreesOfFreedom !== lastFreedom) {
    lastFactor = studentTFactor(level, degreesOfFreedom);
    lastLevel = level;
    lastFreedom = degreesOfFreedom;
  }
  return lastFactor;
}

/** What is said where the data determine nothing. */
export function noEstimate(level = 0.95): Estimate {
  return { estimate: null, standardError: null, interval: null, level };
}

/**
 * The exponential of an estimate of a logarithm. The interval is back-transformed and so asymmetric; the standard
 * error is the relative one times the value, to first order.
 */
export function exponentialOf(logarithm: Estimate): Estimate {
  const { estimate, standardError, interval, level } = logarithm;
  if (estimate === null) return noEstimate(level);
  const value = Math.exp(estimate);
  // Beyond what a double holds there is no number to print.
  if (!Number.isFinite(value) || value === 0) return noEstimate(level);
  return {
    estimate: value,
    standardError: standardError === null ? null : finiteOrNull(value * standardError),
    interval: interval === null ? null : finitePair(Math.exp(interval[0]), Math.exp(interval[1])),
    level,
  };
}

function finiteOrNull(value: number): number | null {
  return Number.isFinite(value) ? value : null;
}

function finitePair(low: number, high: number): readonly [number, number] | null {
  return Number.isFinite(low) && Number.isFinite(high) ? [low, high] : null;
}
