import {
  columnOf,
  dot,
  householderQr,
  type Matrix,
  type QrFactors,
  solveUpper,
} from "kinetics-core/linear-algebra";
import { productError } from "./compensated-dot";
import { amend, type TwicePrecise, twicePrecise } from "./twice-precision";

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
  let before = 1;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    const left = defectOf(system, solution, response);
    const slope = gradientDefectOf(system, solution, gradient);
    const change = correct(system, solution, left, slope);
    // What is left now is the last change once more reduced by the same factor.
    const isDone = round > 0 && change * (change / before) <= Number.EPSILON / 8;
    if (isDone || (round > 1 && !(change < 0.5 * before))) break;
    before = change;
  }
  return solution;
}

/** y − r − X b: column after column, with the rounding of each point's sum kept beside it. */
function defectOf(
  { columns, points }: RefinedSystem,
  { coefficients, residuals }: RefinedSolution,
  response: TwicePrecise | null,
): Float64Array {
  const left = Float64Array.from(response?.values ?? new Float64Array(points));
  const error = Float64Array.from(response?.remainders ?? new Float64Array(points));
  subtractFrom(left, error, residuals, 1, 0);
  columns.forEach((column, j) => {
    subtractFrom(left, error, column, coefficients.values[j] ?? 0, coefficients.remainders[j] ?? 0);
  });
  for (let i = 0; i < points; i++) left[i] = (left[i] ?? 0) + (error[i] ?? 0);
  return left;
}

/** sum −= numbers·(factor + remainder), in twice the working precision. */
function subtractFrom(
  sum: Float64Array,
  error: Float64Array,
  { values, remainders }: TwicePrecise,
  factor: number,
  remainder: number,
): void {
  for (let i = 0; i < sum.length; i++) {
    const value = values[i] ?? 0;
    const product = -value * factor;
    const before = sum[i] ?? 0;
    const after = before + product;
    const shift = after - before;
    const lost = before - (after - shift) + (product - shift) - productError(value, factor, -product);
    sum[i] = after;
    error[i] = (error[i] ?? 0) + lost - (remainders[i] ?? 0) * factor - value * remainder;
  }
}

/** g − Xᵀr. */
function gradientDefectOf(
  { columns }: RefinedSystem,
  { residuals }: RefinedSolution,
  gradient: ArrayLike<number> | null,
): Float64Array {
  return Float64Array.from(columns, (column, j) => -twiceDot(column, residuals, -(gradient?.[j] ?? 0)));
}

/** start + Σ a·b in twice the working precision. */
function twiceDot(a: TwicePrecise, b: TwicePrecise, start: number): number {
  let sum = start;
  let error = 0;
  for (let i = 0; i < a.values.length; i++) {
    const x = a.values[i] ?? 0;
    const y = b.values[i] ?? 0;
    const product = x * y;
    const before = sum;
    sum += product;
    const shift = sum - before;
    error += before - (sum - shift) + (product - shift) + productError(x, y, product);
    error += (a.remainders[i] ?? 0) * y + x * (b.remainders[i] ?? 0);
  }
  return sum + error;
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
