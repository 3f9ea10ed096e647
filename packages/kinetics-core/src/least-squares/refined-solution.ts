import {
  columnOf,
  dot,
  householderQr,
  type Matrix,
  type QrFactors,
  solveUpper,
} from "kinetics-core/linear-algebra";
import { amend, type TwicePrecise, TwiceSum, twicePrecise } from "./twice-precision";

/**
 * Least squares to the last digits by iterative refinement (Björck, BIT 7 (1967) 257-278; Higham, Accuracy and Stability
 * of Numerical Algorithms, 20.5). Residuals r and coefficients b together solve
 *
 *   r + X b = y,   Xᵀ r = g        (g = 0 for the fit; y = 0, g = −e_j for column j of (XᵀX)⁻¹).
 *
 * What the current pair leaves, f = y − r − X b and g − Xᵀr, is formed in twice the working precision and solved by one
 * QR factorisation of X in working precision,
 *
 *   w = R⁻ᵀ g',  d = Qᵀ f,   δb = R⁻¹ (d − w),   δr = f − Q d + Q w,
 *
 * until corrections are below rounding. The error falls by some κ(X)·ε a round, so that a design whose columns are alike
 * to nine digits still gives all of its digits. QR alone loses κ(X), the normal equations κ(X)².
 */
export interface RefinedSystem {
  readonly columns: readonly TwicePrecise[];
  readonly points: number;
  readonly factors: QrFactors;
}

export interface RefinedSolution {
  readonly coefficients: TwicePrecise;
  readonly residuals: TwicePrecise;
}

const MOST_ROUNDS = 12;

export function refinedSystem(columns: readonly TwicePrecise[], points: number): RefinedSystem {
  const design: Matrix = {
    rows: points,
    columns: columns.length,
    values: new Float64Array(points * columns.length),
  };
  columns.forEach((column, j) => {
    design.values.set(column.values, j * points);
  });
  return { columns, points, factors: householderQr(design) };
}

/** `response` null for zeros; `gradient`: Xᵀr of the solution, null for zeros. */
export function refinedSolution(
  system: RefinedSystem,
  response: TwicePrecise | null,
  gradient: ArrayLike<number> | null,
): RefinedSolution {
  const solution = {
    coefficients: twicePrecise(new Float64Array(system.columns.length)),
    residuals: twicePrecise(new Float64Array(system.points)),
  };
  let before = Number.POSITIVE_INFINITY;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const left = defectOf(system, solution, response);
    const slope = gradientDefectOf(system, solution, gradient);
    const change = correct(system, solution, left, slope);
    if (change <= Number.EPSILON ** 2 || !(change < 0.5 * before)) break;
    before = change;
  }
  return solution;
}

/** y − r − X b. */
function defectOf(
  { columns, points }: RefinedSystem,
  { coefficients, residuals }: RefinedSolution,
  response: TwicePrecise | null,
): Float64Array {
  const left = new Float64Array(points);
  const sum = new TwiceSum();
  for (let i = 0; i < points; i++) {
    sum.start(response?.values[i] ?? 0);
    sum.addSmall((response?.remainders[i] ?? 0) - (residuals.remainders[i] ?? 0));
    sum.add(-(residuals.values[i] ?? 0));
    columns.forEach(({ values, remainders }, j) => {
      const value = values[i] ?? 0;
      const coefficient = -(coefficients.values[j] ?? 0);
      sum.addProduct(value, coefficient);
      sum.addSmall((remainders[i] ?? 0) * coefficient - value * (coefficients.remainders[j] ?? 0));
    });
    left[i] = sum.value;
  }
  return left;
}

/** g − Xᵀr. */
function gradientDefectOf(
  { columns, points }: RefinedSystem,
  { residuals }: RefinedSolution,
  gradient: ArrayLike<number> | null,
): Float64Array {
  const sum = new TwiceSum();
  return Float64Array.from(columns, ({ values, remainders }, j) => {
    sum.start(gradient?.[j] ?? 0);
    for (let i = 0; i < points; i++) {
      const residual = -(residuals.values[i] ?? 0);
      const value = values[i] ?? 0;
      sum.addProduct(value, residual);
      sum.addSmall((remainders[i] ?? 0) * residual - value * (residuals.remainders[i] ?? 0));
    }
    return sum.value;
  });
}

/** Adds δb and δr; the largest relative change of a coefficient. */
function correct(
  { factors: { q, r }, points }: RefinedSystem,
  { coefficients, residuals }: RefinedSolution,
  left: Float64Array,
  slope: Float64Array,
): number {
  const n = r.columns;
  const alongR = solveLowerTransposed(r, slope);
  const along = Float64Array.from({ length: n }, (_, j) => dot(columnOf(q, j), left));
  const shift = solveUpper(
    r,
    along.map((value, j) => value - (alongR[j] ?? 0)),
  );
  let change = 0;
  shift.forEach((value, j) => {
    amend(coefficients, j, value);
    const size = Math.abs(coefficients.values[j] ?? 0);
    if (size > 0) change = Math.max(change, Math.abs(value) / size);
  });
  for (let j = 0; j < n; j++) {
    const column = columnOf(q, j);
    const move = (alongR[j] ?? 0) - (along[j] ?? 0);
    for (let i = 0; i < points; i++) left[i] = (left[i] ?? 0) + move * (column[i] ?? 0);
  }
  for (let i = 0; i < points; i++) amend(residuals, i, left[i] ?? 0);
  return change;
}

/** w with Rᵀ w = g, from the first row down. */
function solveLowerTransposed(r: Matrix, g: Float64Array): Float64Array {
  const n = r.columns;
  const w = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let sum = g[i] ?? 0;
    for (let k = 0; k < i; k++) sum -= (r.values[i * n + k] ?? 0) * (w[k] ?? 0);
    w[i] = sum / (r.values[i * n + i] ?? 0);
  }
  return w;
}
