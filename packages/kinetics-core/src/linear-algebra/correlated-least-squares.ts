import { householderQr, invertUpper, solveUpper } from "./householder-qr";
import { inverseGram } from "./least-squares";
import { columnOf, dot, entry, type Matrix, zeroMatrix } from "./matrix";

/**
 * Generalised least squares of y on X with V = diag(d) + U Uᵀ, where U holds a few error terms that rows share.
 *
 * V is never formed. With a standard normal z for each column of U, y = X b + U z + e, and minimising
 * |d^−½ (y − X b − U z)|² + |z|² gives the generalised estimate of b (Henderson's mixed-model equations), here by QR
 * of the augmented matrix
 *     K = [ d^−½ U   d^−½ X ]  = Q R,
 *         [    I        0   ]
 * so that the work grows linearly with the rows. From the same factors follow |V|, |XᵀV⁻¹X| and the projection
 * P = V⁻¹ − V⁻¹X(XᵀV⁻¹X)⁻¹XᵀV⁻¹ = d^−½ (I − Q₁Q₁ᵀ) d^−½, Q₁ the upper m rows of Q.
 * Searle, Casella and McCulloch, Variance Components (1992), 6.6 and 7.
 */
export interface CorrelatedFit {
  readonly coefficients: Float64Array;
  /** (XᵀV⁻¹X)⁻¹. */
  readonly inverseInformation: Matrix;
  /** n by m: coefficients = gain · y, so an error e in y moves them by gain · e. */
  readonly gain: Matrix;
  /** y − X b. */
  readonly residuals: Float64Array;
  /** rᵀV⁻¹r. */
  readonly weightedSumOfSquares: number;
  /** ln|V| + ln|XᵀV⁻¹X| + rᵀV⁻¹r: −2 times the restricted log-likelihood but for a constant. */
  readonly restrictedDeviance: number;
  /** 1 − P_jj/(V⁻¹)_jj, the usual leverage where nothing is shared. */
  readonly leverage: Float64Array;
  /** Diagonal of P. */
  readonly projectionDiagonal: Float64Array;
  /** P y = V⁻¹ r. */
  readonly projected: Float64Array;
  /** P times any vector. */
  readonly project: (vector: ArrayLike<number>) => Float64Array;
}

/** What restricted likelihood needs of a fit, and nothing more: see the fields of the same name in `CorrelatedFit`. */
export type RestrictedFit = Pick<
  CorrelatedFit,
  "restrictedDeviance" | "projectionDiagonal" | "projected" | "project"
>;

/**
 * `variances`: d, all above 0, one a row; `shared`: columns of U, may be empty. X of full column rank, m ≥ n rows.
 */
export function correlatedLeastSquares(
  x: Matrix,
  y: ArrayLike<number>,
  variances: ArrayLike<number>,
  shared: readonly ArrayLike<number>[],
): CorrelatedFit {
  const n = x.columns;
  const factors = factorise(x, variances, shared);
  const { m, p, roots, q, r } = factors;
  const upper = (column: number) => columnOf(q, column).subarray(0, m);

  const tail = zeroMatrix(n, n);
  for (let j = 0; j < n; j++) for (let i = 0; i <= j; i++) tail.values[j * n + i] = entry(r, p + i, p + j);
  const rotated = Float64Array.from({ length: n }, (_, j) => {
    const column = upper(p + j);
    let sum = 0;
    for (let i = 0; i < m; i++) sum += ((column[i] ?? 0) * (y[i] ?? 0)) / (roots[i] ?? 1);
    return sum;
  });
  const coefficients = solveUpper(tail, rotated);
  const residuals = Float64Array.from({ length: m }, (_, i) => {
    let fitted = 0;
    for (let j = 0; j < n; j++) fitted += (coefficients[j] ?? 0) * (x.values[j * m + i] ?? 0);
    return (y[i] ?? 0) - fitted;
  });

  const leverage = new Float64Array(m);
  for (let i = 0; i < m; i++) {
    const byShared = squaredRow(q, i, 0, p);
    leverage[i] = Math.min(1, squaredRow(q, i, p, p + n) / Math.max(1 - byShared, Number.MIN_VALUE));
  }
  // From residuals rather than from y: what the terms explain is gone before it can leave rounding behind.
  const restricted = restrictedFrom(factors, residuals);
  return {
    coefficients,
    inverseInformation: inverseGram(tail),
    gain: gainOf(tail, upper, p, roots),
    residuals,
    weightedSumOfSquares: Math.max(0, dot(residuals, restricted.projected)),
    leverage,
    ...restricted,
  };
}

/** The same fit, as far as restricted likelihood needs it: for the many evaluations of a search. */
export function restrictedFit(
  x: Matrix,
  y: ArrayLike<number>,
  variances: ArrayLike<number>,
  shared: readonly ArrayLike<number>[],
): RestrictedFit {
  return restrictedFrom(factorise(x, variances, shared), y);
}

interface Factors {
  readonly m: number;
  readonly p: number;
  /** √d. */
  readonly roots: Float64Array;
  readonly q: Matrix;
  readonly r: Matrix;
}

function factorise(x: Matrix, variances: ArrayLike<number>, shared: readonly ArrayLike<number>[]): Factors {
  const m = x.rows;
  const p = shared.length;
  const roots = new Float64Array(m);
  for (let i = 0; i < m; i++) {
    const root = Math.sqrt(variances[i] ?? 0);
    if (!(root > 0)) throw new RangeError("every variance must be above 0");
    roots[i] = root;
  }
  const augmented = zeroMatrix(m + p, p + x.columns);
  shared.forEach((column, j) => {
    const target = j * augmented.rows;
    for (let i = 0; i < m; i++) augmented.values[target + i] = (column[i] ?? 0) / (roots[i] ?? 1);
    augmented.values[target + m + j] = 1;
  });
  for (let j = 0; j < x.columns; j++) {
    const target = (p + j) * augmented.rows;
    for (let i = 0; i < m; i++) augmented.values[target + i] = (x.values[j * m + i] ?? 0) / (roots[i] ?? 1);
  }
  return { m, p, roots, ...householderQr(augmented) };
}

function restrictedFrom({ m, roots, q, r }: Factors, y: ArrayLike<number>): RestrictedFit {
  const project = (vector: ArrayLike<number>): Float64Array => {
    const whitened = new Float64Array(m);
    for (let i = 0; i < m; i++) whitened[i] = (vector[i] ?? 0) / (roots[i] ?? 1);
    const rest = whitened.slice();
    for (let j = 0; j < q.columns; j++) {
      const start = j * q.rows;
      let projection = 0;
      for (let i = 0; i < m; i++) projection += (whitened[i] ?? 0) * (q.values[start + i] ?? 0);
      for (let i = 0; i < m; i++) rest[i] = (rest[i] ?? 0) - projection * (q.values[start + i] ?? 0);
    }
    for (let i = 0; i < m; i++) rest[i] = (rest[i] ?? 0) / (roots[i] ?? 1);
    return rest;
  };
  const projected = project(y);
  const projectionDiagonal = new Float64Array(m);
  let restrictedDeviance = Math.max(0, dot(y, projected));
  for (let i = 0; i < m; i++) {
    const root = roots[i] ?? 1;
    projectionDiagonal[i] = Math.max(0, 1 - squaredRow(q, i, 0, q.columns)) / root ** 2;
    restrictedDeviance += 2 * Math.log(root);
  }
  for (let j = 0; j < r.columns; j++) restrictedDeviance += 2 * Math.log(Math.abs(entry(r, j, j)));
  return { restrictedDeviance, projectionDiagonal, projected, project };
}

function squaredRow(q: Matrix, row: number, from: number, to: number): number {
  let sum = 0;
  for (let j = from; j < to; j++) {
    const value = q.values[j * q.rows + row] ?? 0;
    sum += value * value;
  }
  return sum;
}

/** R₂₂⁻¹ Q₂ᵀ d^−½. */
function gainOf(
  tail: Matrix,
  upper: (column: number) => Float64Array,
  offset: number,
  roots: Float64Array,
): Matrix {
  const n = tail.columns;
  const m = roots.length;
  const inverse = invertUpper(tail);
  const gain = zeroMatrix(n, m);
  for (let j = 0; j < n; j++) {
    const column = upper(offset + j);
    for (let i = 0; i < m; i++) {
      const weighted = (column[i] ?? 0) / (roots[i] ?? 1);
      for (let k = 0; k <= j; k++)
        gain.values[i * n + k] = (gain.values[i * n + k] ?? 0) + entry(inverse, k, j) * weighted;
    }
  }
  return gain;
}
