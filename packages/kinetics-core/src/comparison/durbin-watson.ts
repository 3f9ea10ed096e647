import { incompleteBeta } from "kinetics-core/distributions";
import {
  columnOf,
  householderQr,
  type Matrix,
  matrixFromColumns,
  singularValues,
  zeroMatrix,
} from "kinetics-core/linear-algebra";
import { sumOfSquares } from "kinetics-core/summation";
import { MOST_EXACT_FREEDOM } from "./constants";

/**
 * Durbin and Watson's d = Σ (e_i − e_{i−1})²/Σ e_i² of residuals in order: 2 where neighbours do not resemble each
 * other, near 0 where a law of the wrong form leaves a wave.
 *
 * Residuals of a fit are not independent, so the null distribution depends on the design: with M = I − QQᵀ the
 * projection off the columns of the (linearised) fit and D the first differences, d < x is Σ (λ_i − x) z_i² < 0 with λ
 * the ν = n − p eigenvalues of M DᵀD M that belong to residuals. Its probability is Imhof's integral (Biometrika 48, 419,
 * 1961); beyond 30 degrees of freedom d/4 is a beta distribution with the exact moments to within 10⁻⁴ (Durbin and
 * Watson, Biometrika 58, 1, 1971). With three degrees that beta would err by 0.06.
 */
export interface DurbinWatson {
  readonly statistic: number;
  /** P(d or less) without serial correlation: small where neighbours resemble each other. */
  readonly pValue: number;
  readonly method: "exact" | "beta with exact moments";
}

/** Residuals and columns in order, both multiplied by √w where weights differ. Null with fewer than two degrees left. */
export function durbinWatson(
  residuals: ArrayLike<number>,
  columns: readonly ArrayLike<number>[],
): DurbinWatson | null {
  const n = residuals.length;
  const freedom = n - columns.length;
  if (freedom < 2) return null;
  const squares = sumOfSquares(residuals);
  const basis = basisOf(columns, n);
  if (!(squares > 0) || basis === null) return null;
  const differences = Array.from({ length: n - 1 }, (_, i) => (residuals[i + 1] ?? 0) - (residuals[i] ?? 0));
  const statistic = sumOfSquares(differences) / squares;
  if (freedom > MOST_EXACT_FREEDOM)
    return { statistic, pValue: betaTail(statistic, basis, n), method: "beta with exact moments" };
  const eigenvalues = residualEigenvalues(basis, n);
  const pValue = imhofBelowZero(eigenvalues.map((value) => value - statistic));
  return pValue === null ? null : { statistic, pValue, method: "exact" };
}

/** Orthonormal columns of the fit; null where they are dependent. */
function basisOf(columns: readonly ArrayLike<number>[], n: number): readonly Float64Array[] | null {
  const { q, r } = householderQr(matrixFromColumns(columns, n));
  const dependent = columns.some(
    (column, j) => !(Math.abs(columnOf(r, j)[j] ?? 0) > 1e-10 * Math.sqrt(sumOfSquares(column))),
  );
  return dependent ? null : columns.map((_, j) => columnOf(q, j));
}

/** Squared singular values of D M, greatest first, without the p zeros of the fitted directions. */
function residualEigenvalues(basis: readonly Float64Array[], n: number): readonly number[] {
  const differences: Matrix = zeroMatrix(n - 1, n);
  const projection = (i: number, j: number) =>
    basis.reduce((sum, q) => sum - (q[i] ?? 0) * (q[j] ?? 0), i === j ? 1 : 0);
  for (let j = 0; j < n; j++)
    for (let i = 0; i < n - 1; i++)
      differences.values[j * (n - 1) + i] = projection(i + 1, j) - projection(i, j);
  return Array.from(singularValues(differences).values.subarray(0, n - basis.length), (value) => value ** 2);
}

/** Step in ln u; the integrand is analytic within π/2 of the real axis, so this is exact to rounding. */
const STEP = 0.25;
const NEGLIGIBLE = 1e-15;

/**
 * P(Σ λ_i z_i² < 0) = ½ − (1/π) ∫ sin θ(u)/(u ρ(u)) du, θ = ½ Σ atan(λ_i u), ρ = Π (1 + λ_i²u²)^¼, by the trapezoidal
 * rule in ln u, both ways from u = 1/max|λ|.
 */
function imhofBelowZero(lambda: readonly number[]): number | null {
  const largest = Math.max(...lambda.map(Math.abs));
  if (!(largest > 0)) return null;
  const integrand = (logarithm: number) => {
    const u = Math.exp(logarithm);
    let angle = 0;
    let logSize = 0;
    for (const value of lambda) {
      angle += 0.5 * Math.atan((value * u) / largest);
      logSize += 0.25 * Math.log1p(((value * u) / largest) ** 2);
    }
    return { value: Math.sin(angle) * Math.exp(-logSize), size: Math.min(u, Math.exp(-logSize)) };
  };
  let sum = integrand(0).value;
  for (const direction of [-1, 1]) {
    for (let step = 1; step < 2000; step++) {
      const { value, size } = integrand(direction * step * STEP);
      sum += value;
      if (size < NEGLIGIBLE) break;
    }
  }
  return Math.min(1, Math.max(0, 0.5 - (STEP * sum) / Math.PI));
}

/**
 * With A = DᵀD: E = tr(MA)/ν, Var = 2 (tr(MAMA) − ν E²)/(ν(ν + 2)), tr(MA) = tr A − tr(QᵀAQ), tr(MAMA) = tr A² −
 * 2 tr(QᵀA²Q) + tr((QᵀAQ)²), tr A = 2n − 2, tr A² = 6n − 8: no n by n matrix is formed.
 */
function betaTail(statistic: number, basis: readonly Float64Array[], n: number): number {
  const images = basis.map(secondDifferences);
  let first = 2 * n - 2;
  let second = 6 * n - 8;
  images.forEach((image, i) => {
    second -= 2 * sumOfSquares(image);
    basis.forEach((direction, j) => {
      let product = 0;
      for (let k = 0; k < n; k++) product += (direction[k] ?? 0) * (image[k] ?? 0);
      if (i === j) first -= product;
      second += product ** 2;
    });
  });
  const freedom = n - basis.length;
  const mean = first / freedom;
  const variance = (2 * (second - freedom * mean ** 2)) / (freedom * (freedom + 2));
  // d/4 has mean x and variance Var/16, so the parameters of the beta add up to x(1 − x)/(Var/16) − 1.
  const x = mean / 4;
  const sum = (x * (1 - x)) / (variance / 16) - 1;
  const at = Math.min(1, Math.max(0, statistic / 4));
  return incompleteBeta(x * sum, (1 - x) * sum, at, 1 - at).lower;
}

/** A x, A = DᵀD. */
function secondDifferences(x: Float64Array): Float64Array {
  const last = x.length - 1;
  return x.map((value, i) => {
    const left = i > 0 ? value - (x[i - 1] ?? 0) : 0;
    const right = i < last ? value - (x[i + 1] ?? 0) : 0;
    return left + right;
  });
}
