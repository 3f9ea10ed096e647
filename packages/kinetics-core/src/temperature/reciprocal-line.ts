import { correlatedLeastSquares, dot, entry, matrixFromColumns } from "kinetics-core/linear-algebra";
import { type Estimate, estimateOf } from "kinetics-core/quantities";
import type { ReciprocalLine, TwoByTwo } from "./temperature";

/**
 * The straight line of an Arrhenius or Eyring plot: y = b₀ + b₁(1/T − x̄), weighted, about its weighted centre so that
 * b₀ and b₁ are uncorrelated and ln A, an extrapolation to 1/T = 0, loses no digits.
 *
 *   C = (XᵀWX)⁻¹,  w_j = 1/variance_j,  s² = Σ w r²/(m − 2), not truncated at 1,
 *   Var L·b = s² L C Lᵀ + Σ_shared (L·A·loading)²,  A the gain of the fit,
 *   degrees of freedom by Welch and Satterthwaite: Var²/((s² L C Lᵀ)²/(m − 2))   (JCGM 100:2008, G.4.1).
 */
export interface LineProblem {
  readonly reciprocals: readonly number[];
  readonly values: readonly number[];
  /** Of each value, above 0. */
  readonly variances: readonly number[];
  /** Signed effect of each shared error on every value. */
  readonly loadings: readonly (readonly number[])[];
  /** `residuals`: s² scales the variances. `stated`: they stand as they are. `none`: nothing is known of the scatter. */
  readonly scatterFrom: "residuals" | "stated" | "none";
}

export interface FittedLine {
  readonly line: ReciprocalLine;
  /** s², or 1 where the variances stand as stated; null where nothing is known. */
  readonly scale: number | null;
}

export function fitReciprocalLine(problem: LineProblem): FittedLine {
  const { reciprocals, values, variances, loadings } = problem;
  const total = variances.reduce((sum, variance) => sum + 1 / variance, 0);
  const centre = reciprocals.reduce((sum, x, j) => sum + x / (variances[j] ?? Number.NaN), 0) / total;
  const terms = matrixFromColumns([reciprocals.map(() => 1), reciprocals.map((x) => x - centre)]);
  const fit = correlatedLeastSquares(terms, values, variances, []);
  const [level = Number.NaN, slope = Number.NaN] = fit.coefficients;
  const freedom = values.length - 2;
  const unscaled = (i: 0 | 1, j: 0 | 1) => entry(fit.inverseInformation, i, j);
  const scale = { residuals: fit.weightedSumOfSquares / freedom, stated: 1, none: null }[problem.scatterFrom];
  const moves = loadings.map((loading): readonly [number, number] => {
    const move = (row: number) => loading.reduce((sum, value, j) => sum + entry(fit.gain, row, j) * value, 0);
    return [move(0), move(1)];
  });
  const moved = (i: 0 | 1, j: 0 | 1) => moves.reduce((sum, move) => sum + move[i] * move[j], 0);
  const line: ReciprocalLine = {
    centre,
    coefficients: [level, slope],
    scatter:
      scale === null
        ? null
        : [
            [scale * unscaled(0, 0), scale * unscaled(0, 1)],
            [scale * unscaled(1, 0), scale * unscaled(1, 1)],
          ],
    stated: [
      [moved(0, 0), moved(0, 1)],
      [moved(1, 0), moved(1, 1)],
    ],
    residualStandardDeviation: freedom > 0 ? Math.sqrt(dot(fit.residuals, fit.residuals) / freedom) : null,
  };
  return { line, scale };
}

/** y − fitted, in the order of the values. */
export function residualsOf(line: ReciprocalLine, reciprocals: readonly number[], values: readonly number[]) {
  const [level, slope] = line.coefficients;
  return values.map((value, j) => value - level - slope * ((reciprocals[j] ?? Number.NaN) - line.centre));
}

/** Weights of b₀ and b₁ in a quantity that is linear in them. */
export type Functional = readonly [number, number];

export interface FunctionalOptions {
  readonly level: number;
  /** Of the scatter; null or 0 leaves the interval out. */
  readonly degreesOfFreedom: number | null;
  /** Variance added to that of the line, with the degrees of freedom of the scatter: a new point's own. */
  readonly added?: number;
}

/** L·b with its standard error and, where degrees of freedom are given, its interval. */
export function estimateFunctional(
  line: ReciprocalLine,
  functional: Functional,
  options: FunctionalOptions,
): Estimate {
  const { level, degreesOfFreedom, added = 0 } = options;
  const estimate = functional[0] * line.coefficients[0] + functional[1] * line.coefficients[1];
  if (line.scatter === null) return estimateOf(estimate, null, null, level);
  const own = quadraticForm(line.scatter, functional, functional) + added;
  const variance = own + quadraticForm(line.stated, functional, functional);
  if (degreesOfFreedom === null || degreesOfFreedom <= 0)
    return { ...estimateOf(estimate, null, null, level), standardError: Math.sqrt(variance) };
  const freedom = own > 0 ? degreesOfFreedom * (variance / own) ** 2 : degreesOfFreedom;
  return estimateOf(estimate, Math.sqrt(variance), freedom, level);
}

/** Covariance of two functionals, shared errors included; null where there is no uncertainty. */
export function covarianceOf(line: ReciprocalLine, first: Functional, second: Functional): TwoByTwo | null {
  const { scatter, stated } = line;
  if (scatter === null) return null;
  const between = (a: Functional, b: Functional) =>
    quadraticForm(scatter, a, b) + quadraticForm(stated, a, b);
  return [
    [between(first, first), between(first, second)],
    [between(second, first), between(second, second)],
  ];
}

function quadraticForm(matrix: TwoByTwo, a: Functional, b: Functional): number {
  return (
    a[0] * (matrix[0][0] * b[0] + matrix[0][1] * b[1]) + a[1] * (matrix[1][0] * b[0] + matrix[1][1] * b[1])
  );
}
