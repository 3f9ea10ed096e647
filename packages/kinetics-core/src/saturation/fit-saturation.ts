import {
  correlationOf,
  covarianceOf,
  type NonlinearProblem,
  type NonlinearSolution,
  type ProfileInterval,
  profileInterval,
  standardErrorsOf,
} from "kinetics-core/least-squares";
import { type Estimate, noEstimate } from "kinetics-core/quantities";
import { lackOfFitOf } from "./lack-of-fit";
import type { SaturationFit, SaturationInput, SaturationResult } from "./saturation";
import { curveFromOrigin, curveInLimits, fitCurve, type SaturationPoints } from "./saturation-curve";
import { saturationFlags } from "./saturation-flags";
import { refusalOf } from "./saturation-input";

/** What was found, before it is put into words. */
export interface Reading {
  readonly points: SaturationPoints;
  readonly level: number;
  readonly shape: "curve" | "straight" | "level" | "unsettled";
  readonly isExact: boolean;
  readonly limiting: Read | null;
  readonly half: Read | null;
  readonly slope: Read | null;
  readonly solution: NonlinearSolution | null;
}

/** One parameter with what its profile says. */
export interface Read {
  readonly estimate: number;
  readonly standardError: number | null;
  readonly profile: ProfileInterval | null;
}

/**
 * The saturation law v = V c/(K + c) of rates at several concentrations. Standard errors are those of the tangent at the
 * solution, intervals are profiles, since V and K are strongly correlated and their errors lopsided wherever the rates
 * have not yet levelled off. Bates and Watts, Nonlinear Regression Analysis (1988), chapters 2 and 6.
 */
export function fitSaturation(input: SaturationInput): SaturationResult {
  const refusal = refusalOf(input);
  if (refusal !== null) return refusal;
  const reading = readPoints(
    { concentrations: input.concentrations, rates: input.rates },
    input.level ?? 0.95,
  );
  return answerOf(reading);
}

function readPoints(points: SaturationPoints, level: number): Reading {
  const found = fitCurve(points);
  const limits = "limits" in found ? found.limits : null;
  const origin = "origin" in found ? found.origin : null;
  const solution = limits ?? origin;
  const inLimits = curveInLimits(points, found.orientation);
  const isExact = solution !== null && isWithoutScatter(solution, points);
  const read = (problem: NonlinearProblem, from: NonlinearSolution, parameter: number): Read => ({
    estimate: from.parameters[parameter] ?? Number.NaN,
    standardError: isExact ? null : (standardErrorsOf(from)?.[parameter] ?? null),
    profile: isExact ? null : profileInterval(problem, from, parameter, level),
  });
  return {
    points,
    level,
    shape: found.shape,
    isExact,
    limiting: limits && read(inLimits, limits, 0),
    half: limits && found.shape === "curve" ? read(inLimits, limits, 1) : null,
    slope: origin && read(curveFromOrigin(points, found.orientation), origin, 0),
    solution,
  };
}

/** Of the largest rate: what is left is the rounding of the rates as written and no scatter of measurement. */
const ROUNDING = 1e-12;

function isWithoutScatter({ residuals }: NonlinearSolution, { rates }: SaturationPoints): boolean {
  const largest = Math.max(...rates.map(Math.abs));
  return residuals.every((residual) => Math.abs(residual) <= ROUNDING * largest);
}

function answerOf(reading: Reading): SaturationFit {
  const { solution, level, points, isExact, shape } = reading;
  const isCurve = shape === "curve" && solution !== null;
  const covariance = isCurve && !isExact ? covarianceOf(solution) : null;
  const correlation = covariance === null || solution === null ? null : correlationOf(solution)?.[0]?.[1];
  const lackOfFit = solution === null ? null : lackOfFitOf(points, solution.residualSquares);
  return {
    status: "fitted",
    limitingRate: estimateFrom(reading.limiting, level),
    halfSaturation: estimateFrom(reading.half, level),
    initialSlope: estimateFrom(reading.slope, level),
    covariance,
    correlation: correlation ?? null,
    residualStandardDeviation: solution?.residualStandardDeviation ?? null,
    degreesOfFreedom: points.rates.length - 2,
    residuals: solution === null ? [] : Array.from(solution.residuals, (residual) => 0 - residual),
    lackOfFit,
    flags: saturationFlags(reading, lackOfFit),
  };
}

function estimateFrom(read: Read | null, level: number): Estimate {
  if (read === null || !Number.isFinite(read.estimate)) return noEstimate(level);
  const { estimate, standardError, profile } = read;
  return { estimate, standardError, interval: profile?.interval ?? null, level };
}
