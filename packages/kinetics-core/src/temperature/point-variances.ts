import { matrixFromColumns } from "kinetics-core/linear-algebra";
import { varianceComponents } from "kinetics-core/rate-law";
import { mean } from "kinetics-core/summation";
import { EXACT_VARIANCE } from "./constants";
import type { TemperaturePoint } from "./temperature";

/**
 * Variance of ln k of each point. u_j² = u²(k)/k² + (E_a u_T/(R T²))², and points scatter beyond what they state: a
 * bath that was off, another day, another stock. As for orders from rates, weights are 1/(u² + f) with
 * f = max(τ̂², mean of u²), τ̂² by restricted likelihood, so that one point with a small stated u cannot carry the line;
 * s² from the residuals then scales them, with what the points state as a floor. Simulated with 3, 4, 5 and 8
 * temperatures over 40 K, stated u even, alternating between 1 and 10 %, or with one poor point, further scatter of 0 to
 * 4 %: E_a covers 95 to 100 % at a nominal 95 %; weights 1/u² with the same s² 64 to 96 %, 1/(u² + τ̂²) 72 to 96 %, and
 * 1/u² taken as known with z 36 to 96 %. The price is two to four times the width where uneven statements are all true.
 */
export interface PointVariances {
  /** u² + f, or 1 for all where nothing is stated and nothing scatters. */
  readonly variances: readonly number[];
  /** u² that counts as a floor of the errors; 0 for `stated` weights, whose errors are the residuals' alone. */
  readonly floors: readonly number[];
  /** τ̂²; null where it is not estimated. */
  readonly between: number | null;
}

export interface PlottedPoints {
  readonly points: readonly TemperaturePoint[];
  /** 1/T / K⁻¹ and ln k, point by point. */
  readonly reciprocals: readonly number[];
  readonly logarithms: readonly number[];
}

/** Whether a point states an uncertainty of its k; one below rounding says that k is a computed figure. */
export function statesUncertainty(point: TemperaturePoint): boolean {
  return ((point.rateConstantUncertainty ?? 0) / point.rateConstant) ** 2 >= EXACT_VARIANCE;
}

/** Whether every point does: taken as exact, the one without would carry the line. */
export function allStated(points: readonly TemperaturePoint[]): boolean {
  return points.every(statesUncertainty);
}

/**
 * `slope`: b₁ of ln k against 1/T (−E_a/R / K), for the part of u(T). `scatterIsKnown`: there are points enough to
 * estimate τ²; otherwise the stated variances stand alone.
 */
export function pointVariances(
  { points, reciprocals, logarithms }: PlottedPoints,
  slope: number,
  weighting: "scatter" | "stated",
  scatterIsKnown: boolean,
): PointVariances {
  const stated = allStated(points);
  const fromRateConstant = (point: TemperaturePoint) =>
    stated ? ((point.rateConstantUncertainty ?? 0) / point.rateConstant) ** 2 : 0;
  const own = points.map(
    (point) =>
      fromRateConstant(point) +
      ((slope * (point.temperatureUncertaintyKelvin ?? 0)) / point.temperatureKelvin ** 2) ** 2,
  );
  const none = own.map(() => 0);
  if (!scatterIsKnown) return { variances: stated ? own : own.map(() => 1), floors: none, between: null };
  if (weighting === "stated" && stated) return { variances: own, floors: none, between: null };
  const between = betweenPoints(reciprocals, logarithms, own);
  const floor = Math.max(between, mean(own));
  const variances = floor < EXACT_VARIANCE ? own.map(() => 1) : own.map((value) => value + floor);
  return { variances, floors: own, between };
}

function betweenPoints(
  reciprocals: readonly number[],
  logarithms: readonly number[],
  own: readonly number[],
): number {
  const centre = mean(reciprocals);
  const terms = matrixFromColumns([reciprocals.map(() => 1), reciprocals.map((x) => x - centre)]);
  return varianceComponents({ terms, response: logarithms, stated: own, shared: [], blocks: [] }).betweenRuns;
}
