import { columnOf, type Matrix, singularValues, zeroMatrix } from "kinetics-core/linear-algebra";
import { compensatedDot } from "./compensated-dot";
import { faultOf, sizeFaultOf } from "./linear-input";
import { type RefinedSystem, refinedSolution, refinedSystem } from "./refined-solution";
import { type TwicePrecise, timesEach, twicePrecise } from "./twice-precision";

/** A column of the design: numbers, or numbers with their rounding kept (`powersOf`). */
export type DesignColumn = ArrayLike<number> | TwicePrecise;

export interface LinearOptions {
  /** One a point, above 0: 1/σ² up to a common factor. Default 1. */
  readonly weights?: ArrayLike<number>;
}

export interface LinearSolution {
  readonly status: "fitted";
  readonly coefficients: Float64Array;
  /** y − X b, not weighted. */
  readonly residuals: Float64Array;
  /** Σ w r². */
  readonly residualSquares: number;
  readonly degreesOfFreedom: number;
  /** √(Σ w r²/(m − n)); null with no degree of freedom. */
  readonly residualStandardDeviation: number | null;
  /** (XᵀWX)⁻¹, n by n in rows. */
  readonly unscaledCovariance: readonly (readonly number[])[];
  /** The residual variance times `unscaledCovariance`; null with no degree of freedom. */
  readonly covariance: readonly (readonly number[])[] | null;
  readonly standardDeviations: readonly number[] | null;
  /**
   * Part of Σ w (y − ȳ)² that the fit explains; of Σ w y² where no column is constant. Null where the response does not
   * vary.
   */
  readonly rSquared: number | null;
}

export type LinearFit =
  | LinearSolution
  | { readonly status: "too-few-points" | "dependent-columns" | "bad-input"; readonly message: string };

/**
 * Linear least squares y ≈ Σ b_j x_j, weighted or not, to nearly all digits that the design carries: QR with refinement
 * (refined-solution.ts) for coefficients, residuals and covariance. Cost: some n² passes over the points.
 *
 * @param columns n columns of m numbers; a column of ones makes the intercept.
 */
export function fitLinear(
  columns: readonly DesignColumn[],
  response: ArrayLike<number>,
  options: LinearOptions = {},
): LinearFit {
  const design = columns.map((column) => ("remainders" in column ? column : twicePrecise(column)));
  const bad = (message: string): LinearFit => ({ status: "bad-input", message });
  const fault = faultOf(design, response, options.weights);
  if (fault !== null) return bad(fault);
  if (response.length < design.length)
    return {
      status: "too-few-points",
      message: `There are ${response.length} points for ${design.length} coefficients; at least as many points as coefficients are needed.`,
    };
  const roots = options.weights && Float64Array.from(options.weights, Math.sqrt);
  const weighted = (numbers: TwicePrecise) => (roots === undefined ? numbers : timesEach(numbers, roots));
  const weightedDesign = design.map(weighted);
  const weightedResponse = weighted(twicePrecise(response));
  const sizeFault = sizeFaultOf(weightedDesign, weightedResponse);
  if (sizeFault !== null) return bad(sizeFault);
  const system = refinedSystem(weightedDesign, response.length);
  const dependence = dependenceIn(system);
  if (dependence !== null) return dependence;
  const { coefficients, residuals } = refinedSolution(system, weightedResponse, null);
  const residualSquares = compensatedDot(residuals.values, residuals.values);
  return {
    status: "fitted",
    coefficients: coefficients.values,
    residuals: residuals.values.map((residual, i) => residual / (roots?.[i] ?? 1)),
    residualSquares,
    ...scatterOf(system, residualSquares),
    rSquared: rSquaredOf(design, response, options.weights, residualSquares),
  };
}

type Scatter = Pick<
  LinearSolution,
  | "degreesOfFreedom"
  | "residualStandardDeviation"
  | "unscaledCovariance"
  | "covariance"
  | "standardDeviations"
>;

function scatterOf(system: RefinedSystem, residualSquares: number): Scatter {
  const degreesOfFreedom = system.points - system.columns.length;
  const unscaledCovariance = unscaledCovarianceOf(system);
  if (degreesOfFreedom === 0)
    return {
      degreesOfFreedom,
      residualStandardDeviation: null,
      unscaledCovariance,
      covariance: null,
      standardDeviations: null,
    };
  const variance = residualSquares / degreesOfFreedom;
  const deviation = Math.sqrt(variance);
  return {
    degreesOfFreedom,
    residualStandardDeviation: deviation,
    unscaledCovariance,
    covariance: unscaledCovariance.map((row) => row.map((value) => variance * value)),
    standardDeviations: unscaledCovariance.map((row, j) => deviation * Math.sqrt(row[j] ?? 0)),
  };
}

/** Columns of unit length that are alike to this part are one column, as far as a double tells. */
const DEPENDENCE = 1e-14;

function dependenceIn({ factors: { r } }: RefinedSystem): LinearFit | null {
  const n = r.columns;
  const unit = zeroMatrix(n, n);
  const named = (list: readonly number[]): LinearFit => ({
    status: "dependent-columns",
    message: `Column${list.length > 1 ? "s" : ""} ${list.join(", ")} of the design cannot be told apart from a combination of each other or from nothing: leave one out.`,
  });
  for (let j = 0; j < n; j++) {
    const length = lengthOf(r, j);
    if (!(length > 0)) return named([j]);
    for (let i = 0; i <= j; i++) unit.values[j * n + i] = (r.values[j * n + i] ?? 0) / length;
  }
  const { values, v } = singularValues(unit);
  if ((values[n - 1] ?? 0) > DEPENDENCE * (values[0] ?? 0)) return null;
  const direction = Array.from(columnOf(v, n - 1));
  return named(direction.flatMap((share, j) => (Math.abs(share) > 1e-3 ? [j] : [])));
}

function lengthOf(r: Matrix, j: number): number {
  return Math.sqrt(columnOf(r, j).reduce((sum, value) => sum + value * value, 0));
}

/** Column by column from XᵀX c = e_j, made symmetric. */
function unscaledCovarianceOf(system: RefinedSystem): number[][] {
  const columns = system.columns.map((_, j) => {
    const gradient = system.columns.map((_column, k) => (k === j ? -1 : 0));
    return refinedSolution(system, null, gradient).coefficients.values;
  });
  return columns.map((column, i) => columns.map((other, j) => ((column[j] ?? 0) + (other[i] ?? 0)) / 2));
}

function rSquaredOf(
  design: readonly TwicePrecise[],
  response: ArrayLike<number>,
  weights: ArrayLike<number> | undefined,
  residualSquares: number,
): number | null {
  const weight = (i: number) => weights?.[i] ?? 1;
  const y = Array.from(response);
  const hasIntercept = design.some(({ values }) => values.every((value) => value === values[0]));
  const total = y.reduce((sum, _, i) => sum + weight(i), 0);
  const mean = hasIntercept ? y.reduce((sum, value, i) => sum + weight(i) * value, 0) / total : 0;
  const squares = y.reduce((sum, value, i) => sum + weight(i) * (value - mean) ** 2, 0);
  return squares > 0 ? 1 - residualSquares / squares : null;
}
