import { entry, type Matrix, zeroMatrix } from "./matrix";

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
  // Plain index arithmetic: this loop runs inside every search for a variance.
  const work = Float64Array.from(matrix.values);
  const norms = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    const norm = normFrom(work, j * m, j * m + m);
    norms[j] = norm;
    if (norm > 0) for (let i = j * m; i < j * m + m; i++) work[i] = (work[i] ?? 0) / norm;
  }

  const r = zeroMatrix(n, n);
  for (let k = 0; k < n; k++) {
    // The reflector v stays in place of column k from the diagonal down; H = I − 2 v vᵀ with |v| = 1.
    const start = k * m + k;
    const end = k * m + m;
    const norm = normFrom(work, start, end);
    const diagonal = (work[start] ?? 0) > 0 ? -norm : norm;
    if (norm > 0) {
      work[start] = (work[start] ?? 0) - diagonal;
      const length = normFrom(work, start, end);
      for (let i = start; i < end; i++) work[i] = (work[i] ?? 0) / length;
    }
    r.values[k * n + k] = diagonal * (norms[k] ?? 0);
    for (let j = k + 1; j < n; j++) {
      reflect(work, start, end, work, j * m + k);
      r.values[j * n + k] = (work[j * m + k] ?? 0) * (norms[j] ?? 0);
    }
  }

  const q = zeroMatrix(m, n);
  for (let j = 0; j < n; j++) {
    q.values[j * m + j] = 1;
    for (let k = n - 1; k >= 0; k--) reflect(work, k * m + k, k * m + m, q.values, j * m + k);
  }
  return { q, r };
}

function normFrom(values: Float64Array, start: number, end: number): number {
  let sum = 0;
  for (let i = start; i < end; i++) {
    const value = values[i] ?? 0;
    sum += value * value;
  }
  return Math.sqrt(sum);
}

/** Applies the reflector `work[start, end)` to the stretch of `target` that begins at `at`. */
function reflect(work: Float64Array, start: number, end: number, target: Float64Array, at: number): void {
  const shift = at - start;
  let projection = 0;
  for (let i = start; i < end; i++) projection += (work[i] ?? 0) * (target[i + shift] ?? 0);
  if (projection === 0) return;
  projection *= 2;
  for (let i = start; i < end; i++)
    target[i + shift] = (target[i + shift] ?? 0) - projection * (work[i] ?? 0);
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
