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
 *
 * Three or four points may lie on a line by luck, and s² is then far below what each states about itself. So the
 * uncertainties that the points state are propagated through the same estimator, A diag(u²) Aᵀ, as known variances; the
 * standard error is the greater of the two, and the interval the wider of t(m − 2) on scatter and z on what is stated.
 */
export interface LineProblem {
  readonly reciprocals: readonly number[];
  readonly values: readonly number[];
  /** Of each value, above 0. */
  readonly variances: readonly number[];
  /** u² that each point states about itself; 0 where it states nothing. A lucky s² does not go below it. */
  readonly floors: readonly number[];
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
  const { reciprocals, values, variances, floors, loadings } = problem;
  const total = variances.reduce((sum, variance) => sum + 1 / variance, 0);
  const centre = reciprocals.reduce((sum, x, j) => sum + x / (variances[j] ?? Number.NaN), 0) / total;
  const terms = matrixFromColumns([reciprocals.map(() => 1), reciprocals.map((x) => x - centre)]);
  const fit = correlatedLeastSquares(terms, values, variances, []);
  const [level = Number.NaN, slope = Number.NaN] = fit.coefficients;
  const freedom = values.length - 2;
  const unscaled = (i: 0 | 1, j: 0 | 1) => entry(fit.inverseInformation, i, j);
  const scale = { residuals: fit.weightedSumOfSquares / freedom, stated: 1, none: null }[problem.scatterFrom];
  const propagated = (i: 0 | 1, j: 0 | 1) =>
    floors.reduce((sum, floor, m) => sum + entry(fit.gain, i, m) * entry(fit.gain, j, m) * floor, 0);
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
    floor: [
      [propagated(0, 0), propagated(0, 1)],
      [propagated(1, 0), propagated(1, 1)],
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
  const shared = quadraticForm(line.stated, functional, functional);
  const scatter = quadraticForm(line.scatter, functional, functional) + added;
  const floor = quadraticForm(line.floor, functional, functional) + added;
  const standardError = Math.sqrt((floorCounts(line) ? floor : scatter) + shared);
  const alone = { ...estimateOf(estimate, null, null, level), standardError };
  if (degreesOfFreedom === null || degreesOfFreedom <= 0) return alone;
  const freedom = scatter > 0 ? degreesOfFreedom * ((scatter + shared) / scatter) ** 2 : degreesOfFreedom;
  const byScatter = estimateOf(estimate, Math.sqrt(scatter + shared), freedom, level);
  const byStatement = estimateOf(estimate, Math.sqrt(floor + shared), Number.POSITIVE_INFINITY, level);
  return { ...alone, interval: wider(byScatter.interval, byStatement.interval) };
}

/** Whether the points' own statements exceed their scatter, judged by the slope so that all of a line agrees. */
function floorCounts({ scatter, floor }: ReciprocalLine): boolean {
  return scatter !== null && floor[1][1] > scatter[1][1];
}

function wider(one: Estimate["interval"], other: Estimate["interval"]): Estimate["interval"] {
  if (one === null || other === null) return one ?? other;
  return one[1] - one[0] >= other[1] - other[0] ? one : other;
}

/** Covariance of two functionals, shared errors included; null where there is no uncertainty. */
export function covarianceOf(line: ReciprocalLine, first: Functional, second: Functional): TwoByTwo | null {
  const { scatter, floor, stated } = line;
  if (scatter === null) return null;
  const own = floorCounts(line) ? floor : scatter;
  const between = (a: Functional, b: Functional) => quadraticForm(own, a, b) + quadraticForm(stated, a, b);
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
