import { LEAST_PIVOT } from "./constants";

/**
 * Inverse and determinant of a symmetric positive definite matrix by Cholesky, A = D L Lᵀ D with D² the diagonal of
 * A, so that parameters of very different size (ln k, a scale, an order) lose no digits.
 */
export type PositiveFactors =
  | {
      readonly status: "positive";
      /** p by p, row after row. */
      readonly inverse: Float64Array;
      readonly logDeterminant: number;
    }
  /** `parameter`: the first that the ones before leave nothing to determine by. */
  | { readonly status: "deficient"; readonly parameter: number };

/** `matrix`: p by p, row after row; only its lower half is read. */
export function factorisePositive(matrix: Float64Array, p: number): PositiveFactors {
  const factor = scaledCholesky(matrix, p);
  if (factor.status === "deficient") return factor;
  const { lower, scale } = factor;
  let logDeterminant = 0;
  for (let i = 0; i < p; i++) logDeterminant += 2 * Math.log((lower[i * p + i] ?? 1) * (scale[i] ?? 1));
  return { status: "positive", inverse: inverseFrom(lower, scale, p), logDeterminant };
}

/** F = D L, lower triangular, with A = F Fᵀ; null where A is not positive definite. */
export function lowerRoot(matrix: Float64Array, p: number): Float64Array | null {
  const factor = scaledCholesky(matrix, p);
  if (factor.status === "deficient") return null;
  return factor.lower.map((value, place) => value * (factor.scale[Math.floor(place / p)] ?? 1));
}

type ScaledCholesky =
  | { readonly status: "positive"; readonly lower: Float64Array; readonly scale: Float64Array }
  | { readonly status: "deficient"; readonly parameter: number };

function scaledCholesky(matrix: Float64Array, p: number): ScaledCholesky {
  const scale = Float64Array.from({ length: p }, (_, i) => Math.sqrt(Math.max(0, matrix[i * p + i] ?? 0)));
  const lower = new Float64Array(p * p);
  for (let i = 0; i < p; i++) {
    const size = scale[i] ?? 0;
    if (!(size > 0 && Number.isFinite(size))) return { status: "deficient", parameter: i };
    for (let j = 0; j <= i; j++) {
      let rest = (matrix[i * p + j] ?? 0) / size / (scale[j] ?? 1);
      for (let k = 0; k < j; k++) rest -= (lower[i * p + k] ?? 0) * (lower[j * p + k] ?? 0);
      if (j < i) lower[i * p + j] = rest / (lower[j * p + j] ?? 1);
      else {
        if (!(rest > LEAST_PIVOT)) return { status: "deficient", parameter: i };
        lower[i * p + i] = Math.sqrt(rest);
      }
    }
  }
  return { status: "positive", lower, scale };
}

/** D⁻¹ L⁻ᵀ L⁻¹ D⁻¹. */
function inverseFrom(lower: Float64Array, scale: Float64Array, p: number): Float64Array {
  const below = new Float64Array(p * p);
  for (let j = 0; j < p; j++) {
    for (let i = j; i < p; i++) {
      let rest = i === j ? 1 : 0;
      for (let k = j; k < i; k++) rest -= (lower[i * p + k] ?? 0) * (below[k * p + j] ?? 0);
      below[i * p + j] = rest / (lower[i * p + i] ?? 1);
    }
  }
  const inverse = new Float64Array(p * p);
  for (let i = 0; i < p; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = 0;
      for (let k = i; k < p; k++) sum += (below[k * p + i] ?? 0) * (below[k * p + j] ?? 0);
      sum /= (scale[i] ?? 1) * (scale[j] ?? 1);
      inverse[i * p + j] = sum;
      inverse[j * p + i] = sum;
    }
  }
  return inverse;
}

/** Matrix (p by p, row after row) times vector. */
export function timesVector(matrix: Float64Array, vector: ArrayLike<number>, p: number): Float64Array {
  const product = new Float64Array(p);
  for (let i = 0; i < p; i++) {
    let sum = 0;
    for (let j = 0; j < p; j++) sum += (matrix[i * p + j] ?? 0) * (vector[j] ?? 0);
    product[i] = sum;
  }
  return product;
}

/** aᵀ M b. */
export function bilinear(
  a: ArrayLike<number>,
  matrix: Float64Array,
  b: ArrayLike<number>,
  p: number,
): number {
  let sum = 0;
  for (let i = 0; i < p; i++) {
    let row = 0;
    for (let j = 0; j < p; j++) row += (matrix[i * p + j] ?? 0) * (b[j] ?? 0);
    sum += (a[i] ?? 0) * row;
  }
  return sum;
}
