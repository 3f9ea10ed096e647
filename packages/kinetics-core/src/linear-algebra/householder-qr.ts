import { columnOf, dot, entry, type Matrix, zeroMatrix } from "./matrix";

/**
 * Thin QR factorisation A = Q R by Householder reflections, m ≥ n. Each column is divided by its norm first and R is
 * scaled back, so that columns of very different size (1, t, t², …) lose no digits; a zero column gives a zero in R.
 * Golub and Van Loan, Matrix Computations, 5.2.
 */
export interface QrFactors {
  /** m by n, orthonormal columns. */
  readonly q: Matrix;
  /** n by n, upper triangular. */
  readonly r: Matrix;
}

export function householderQr(matrix: Matrix): QrFactors {
  const { rows: m, columns: n } = matrix;
  if (m < n) throw new RangeError(`QR needs at least as many rows as columns, got ${m} by ${n}`);
  const work: Matrix = { rows: m, columns: n, values: Float64Array.from(matrix.values) };
  const norms = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    const column = columnOf(work, j);
    const norm = Math.sqrt(dot(column, column));
    norms[j] = norm;
    if (norm > 0) for (let i = 0; i < m; i++) column[i] = (column[i] ?? 0) / norm;
  }

  const r = zeroMatrix(n, n);
  for (let k = 0; k < n; k++) {
    // The reflector v stays in place of column k from the diagonal down; H = I − 2 v vᵀ with |v| = 1.
    const below = columnOf(work, k).subarray(k);
    const norm = Math.sqrt(dot(below, below));
    const diagonal = (below[0] ?? 0) > 0 ? -norm : norm;
    if (norm > 0) {
      below[0] = (below[0] ?? 0) - diagonal;
      const length = Math.sqrt(dot(below, below));
      for (let i = 0; i < below.length; i++) below[i] = (below[i] ?? 0) / length;
    }
    r.values[k * n + k] = diagonal * (norms[k] ?? 0);
    for (let j = k + 1; j < n; j++) {
      const rest = columnOf(work, j).subarray(k);
      reflect(below, rest);
      r.values[j * n + k] = (rest[0] ?? 0) * (norms[j] ?? 0);
    }
  }

  const q = zeroMatrix(m, n);
  for (let j = 0; j < n; j++) {
    const column = columnOf(q, j);
    column[j] = 1;
    for (let k = n - 1; k >= 0; k--) reflect(columnOf(work, k).subarray(k), column.subarray(k));
  }
  return { q, r };
}

function reflect(reflector: Float64Array, vector: Float64Array): void {
  const projection = 2 * dot(reflector, vector);
  if (projection === 0) return;
  for (let i = 0; i < vector.length; i++) vector[i] = (vector[i] ?? 0) - projection * (reflector[i] ?? 0);
}

/** x with R x = b for upper triangular R, from the last row up. A zero on the diagonal throws: rank is the caller's to settle. */
export function solveUpper(r: Matrix, b: ArrayLike<number>): Float64Array {
  const n = r.columns;
  const x = new Float64Array(n);
  for (let i = n - 1; i >= 0; i--) {
    let sum = b[i] ?? 0;
    for (let j = i + 1; j < n; j++) sum -= entry(r, i, j) * (x[j] ?? 0);
    const diagonal = entry(r, i, i);
    if (diagonal === 0) throw new RangeError("the triangular matrix is singular");
    x[i] = sum / diagonal;
  }
  return x;
}

/** R⁻¹ of an upper triangular R. */
export function invertUpper(r: Matrix): Matrix {
  const n = r.columns;
  const inverse = zeroMatrix(n, n);
  for (let j = 0; j < n; j++) {
    const unit = new Float64Array(n);
    unit[j] = 1;
    inverse.values.set(solveUpper(r, unit), j * n);
  }
  return inverse;
}
