import { columnOf, dot, type Matrix, zeroMatrix } from "./matrix";

/**
 * Singular value decomposition A = U S Vᵀ by one-sided Jacobi rotations (Hestenes), which finds small singular values
 * to high relative accuracy. Any shape; with m < n the surplus singular values are 0.
 */
export interface SingularValues {
  /** n values, greatest first. */
  readonly values: Float64Array;
  /** n by n; column j belongs to `values[j]`. */
  readonly v: Matrix;
  /** A V: m by n, column j of length `values[j]`. */
  readonly scaled: Matrix;
}

export function singularValues(matrix: Matrix): SingularValues {
  const { rows: m, columns: n } = matrix;
  const work: Matrix = { rows: m, columns: n, values: Float64Array.from(matrix.values) };
  const v = zeroMatrix(n, n);
  for (let j = 0; j < n; j++) v.values[j * n + j] = 1;
  for (let sweep = 0; sweep < 60; sweep++) {
    let rotated = false;
    for (let p = 0; p < n - 1; p++) {
      for (let q = p + 1; q < n; q++) {
        const a = columnOf(work, p);
        const b = columnOf(work, q);
        const alpha = dot(a, a);
        const beta = dot(b, b);
        const gamma = dot(a, b);
        if (gamma === 0 || Math.abs(gamma) <= 1e-16 * Math.sqrt(alpha * beta)) continue;
        rotated = true;
        const zeta = (beta - alpha) / (2 * gamma);
        const tangent = (zeta >= 0 ? 1 : -1) / (Math.abs(zeta) + Math.hypot(1, zeta));
        const cosine = 1 / Math.hypot(1, tangent);
        rotate(a, b, cosine, cosine * tangent);
        rotate(columnOf(v, p), columnOf(v, q), cosine, cosine * tangent);
      }
    }
    if (!rotated) break;
  }
  return sorted(work, v);
}

function rotate(a: Float64Array, b: Float64Array, cosine: number, sine: number): void {
  for (let i = 0; i < a.length; i++) {
    const first = a[i] ?? 0;
    const second = b[i] ?? 0;
    a[i] = cosine * first - sine * second;
    b[i] = sine * first + cosine * second;
  }
}

function sorted(work: Matrix, v: Matrix): SingularValues {
  const n = work.columns;
  const lengths = Array.from({ length: n }, (_, j) => {
    const column = columnOf(work, j);
    return Math.sqrt(dot(column, column));
  });
  const order = lengths.map((_, j) => j).sort((a, b) => (lengths[b] ?? 0) - (lengths[a] ?? 0));
  const values = new Float64Array(n);
  const sortedV = zeroMatrix(n, n);
  const scaled = zeroMatrix(work.rows, n);
  order.forEach((from, to) => {
    values[to] = lengths[from] ?? 0;
    sortedV.values.set(columnOf(v, from), to * n);
    scaled.values.set(columnOf(work, from), to * work.rows);
  });
  return { values, v: sortedV, scaled };
}

/** Number of singular values above `tolerance` (absolute). */
export function rankOf(decomposition: SingularValues, tolerance: number): number {
  return decomposition.values.filter((value) => value > tolerance).length;
}
