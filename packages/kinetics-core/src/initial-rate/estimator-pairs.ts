import { BIAS_WEIGHT, LACK_OF_FIT_LEVEL } from "./constants";
import type { EstimatorPair } from "./initial-rate";
import { exponentialFit, generalOrderFit, type LackOfFit } from "./integrated-slopes";
import { type PolynomialSlopes, polynomialCurve, polynomialSlopes } from "./polynomial-slopes";
import type { Readings } from "./readings";
import type { NoiseModel } from "./trace-noise";
import { isDetermined, type WindowFit } from "./window-fit";

/** Two nested estimators on one window. */
export interface PairFit {
  readonly pair: EstimatorPair;
  readonly lower: WindowFit;
  readonly upper: WindowFit;
  /** M = se²(lower) + 4(b_lower − b_upper)². */
  readonly criterion: number;
  /** Of the upper member against degree six; null for polynomials and where too few readings are left over. */
  readonly lackOfFit: LackOfFit | null;
}

const POLYNOMIAL_PAIRS = [
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
    slope: fit.slopes[degree] ?? Number.NaN,
    standardError: fit.standardErrors[degree] ?? Number.NaN,
    settled: true,
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

/** Exponential→general order on one window of at least 6 readings; none where the readings do not fix a slope. */
export function integratedPairs(readings: Readings, noise: NoiseModel, from: number, to: number): PairFit[] {
  const lower = exponentialFit(readings, noise, from, to);
  const upper = generalOrderFit(readings, noise, from, to);
  if (!isDetermined(lower) || !isDetermined(upper)) return [];
  return [pairOf("exponential-general", lower, upper, upper.lackOfFit)];
}

/** Whether the pair may enter the choice: a general order that misses the trace's own shape may not. */
export function isAdequate(pair: PairFit): boolean {
  return isSettled(pair) && (pair.lackOfFit === null || pair.lackOfFit.pValue > LACK_OF_FIT_LEVEL);
}

/** Whether the searches of both members ended; on readings that hardly curve, that of a general order may not. */
export function isSettled({ lower, upper }: PairFit): boolean {
  return lower.settled && upper.settled;
}

function pairOf(
  pair: EstimatorPair,
  lower: WindowFit,
  upper: WindowFit,
  lackOfFit: LackOfFit | null = null,
): PairFit {
  const criterion = lower.standardError ** 2 + BIAS_WEIGHT * (lower.slope - upper.slope) ** 2;
  return { pair, lower, upper, criterion, lackOfFit };
}
