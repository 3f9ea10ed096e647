import { householderQr, invertUpper, solveUpper } from "./householder-qr";
import { columnOf, dot, entry, type Matrix, times, zeroMatrix } from "./matrix";

/** Solution of min |y − X b|², by QR and never by XᵀX. */
export interface LeastSquaresSolution {
  readonly coefficients: Float64Array;
  /** y − X b. */
  readonly residuals: Float64Array;
  readonly residualSumOfSquares: number;
  /** (XᵀX)⁻¹. */
  readonly inverseGram: Matrix;
  /** Diagonal of the hat matrix, between 0 and 1. */
  readonly leverage: Float64Array;
}

/**
 * Ordinary least squares, X of full column rank with m ≥ n rows. For weights w multiply rows of X and y by √w first.
 * Throws RangeError where a column is an exact combination of others (`rankOf` tells beforehand).
 */
export function leastSquares(x: Matrix, y: ArrayLike<number>): LeastSquaresSolution {
  const { q, r } = householderQr(x);
  const projections = new Float64Array(x.columns);
  for (let j = 0; j < x.columns; j++) projections[j] = dot(columnOf(q, j), y);
  const coefficients = solveUpper(r, projections);
  const fitted = times(x, coefficients);
  const residuals = new Float64Array(x.rows);
  const leverage = new Float64Array(x.rows);
  for (let i = 0; i < x.rows; i++) {
    residuals[i] = (y[i] ?? 0) - (fitted[i] ?? 0);
    let sum = 0;
    for (let j = 0; j < x.columns; j++) sum += entry(q, i, j) ** 2;
    leverage[i] = sum;
  }
  return {
    coefficients,
    residuals,
    residualSumOfSquares: dot(residuals, residuals),
    inverseGram: inverseGram(r),
    leverage,
  };
}

/** (RᵀR)⁻¹ = R⁻¹R⁻ᵀ for upper triangular R. */
export function inverseGram(r: Matrix): Matrix {
  const n = r.columns;
  const inverse = invertUpper(r);
  const gram = zeroMatrix(n, n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      let sum = 0;
      for (let k = Math.max(i, j); k < n; k++) sum += entry(inverse, i, k) * entry(inverse, j, k);
      gram.values[j * n + i] = sum;
    }
  }
  return gram;
}
