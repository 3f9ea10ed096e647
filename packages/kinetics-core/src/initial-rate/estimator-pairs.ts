import { BIAS_WEIGHT } from "./constants";
import type { Estimator, EstimatorPair, FittedCurve } from "./initial-rate";
import { type PolynomialSlopes, polynomialCurve, polynomialSlopes } from "./polynomial-slopes";
import type { Readings } from "./readings";
import type { NoiseModel } from "./trace-noise";

/** One estimator on one window of readings [from, to). */
export interface WindowFit {
  readonly estimator: Estimator;
  readonly degree: number | null;
  readonly from: number;
  readonly to: number;
  readonly slope: number;
  readonly standardError: number;
  /** Made when asked for: most windows that are tried are never drawn. */
  readonly curve: () => FittedCurve;
}

/** Two nested estimators on one window. */
export interface PairFit {
  readonly pair: EstimatorPair;
  readonly lower: WindowFit;
  readonly upper: WindowFit;
  /** M = se²(lower) + 4(b_lower − b_upper)². */
  readonly criterion: number;
}

export const POLYNOMIAL_PAIRS = [
  { pair: "line-quadratic", upperDegree: 2 },
  { pair: "quadratic-cubic", upperDegree: 3 },
  { pair: "cubic-quartic", upperDegree: 4 },
] as const satisfies readonly { pair: EstimatorPair; upperDegree: number }[];

/** A member of a pair out of the polynomials on one window. */
export function polynomialFit(fit: PolynomialSlopes, degree: number): WindowFit {
  return {
    estimator: degree === 1 ? "straight" : "tangent",
    degree,
    from: fit.from,
    to: fit.to,
    slope: fit.slopes[degree] as number,
    standardError: fit.standardErrors[degree] as number,
    curve: () => ({ kind: "polynomial", coefficients: polynomialCurve(fit, degree) }),
  };
}

/** Line→quadratic, quadratic→cubic and cubic→quartic on one window of at least 5 readings. */
export function polynomialPairs(
  readings: Readings,
  noise: NoiseModel,
  from: number,
  to: number,
  scratch?: Float64Array,
): PairFit[] {
  const fit = polynomialSlopes(readings, noise, from, to, 4, scratch);
  return POLYNOMIAL_PAIRS.map(({ pair, upperDegree }) =>
    pairOf(pair, polynomialFit(fit, upperDegree - 1), polynomialFit(fit, upperDegree)),
  );
}

export function pairOf(pair: EstimatorPair, lower: WindowFit, upper: WindowFit): PairFit {
  const criterion = lower.standardError ** 2 + BIAS_WEIGHT * (lower.slope - upper.slope) ** 2;
  return { pair, lower, upper, criterion };
}
