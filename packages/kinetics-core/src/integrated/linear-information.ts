import {
  columnOf,
  dot,
  householderQr,
  matrixFromColumns,
  singularValues,
} from "kinetics-core/linear-algebra";

/**
 * What a linearised fit knows of its parameters p: with J the columns ∂(fitted)/∂p, any quantity f(p) moves by
 * gᵀδp, g = ∂f/∂p, and its least-squares estimate by aᵀ(error of the readings) with the row
 *
 *   a = J (JᵀJ)⁺ g.
 *
 * A quantity whose g leans on a direction that J does not see is not determined, whatever value the search stopped at;
 * others are, even where some parameters are not (the slope of a straight trace, though not its end). By QR of the
 * column-scaled J and singular values of R.
 */
export interface LinearInformation {
  /** a, one entry a row of J; null where the quantity is not determined. */
  rowOf(gradient: readonly number[]): Float64Array | null;
  /** Orthonormal basis of what J spans. */
  readonly basis: readonly Float64Array[];
}

/** Singular values of the column-scaled J below this part of the largest are rounding. */
const SMALLEST_SINGULAR_PART = 1e-9;
/** Part of a quantity's scaled gradient that may lie in an unseen direction without leaving it undetermined. */
const LARGEST_UNSEEN_PART = 1e-5;

export function linearInformation(jacobian: readonly Float64Array[]): LinearInformation {
  const scales = jacobian.map((column) => {
    const length = Math.sqrt(dot(column, column));
    return length > 0 ? 1 / length : 0;
  });
  const scaled = matrixFromColumns(
    jacobian.map((column, j) => column.map((entry) => entry * (scales[j] ?? 0))),
  );
  const count = jacobian.length;
  const { values, v } = singularValues(scaled.rows >= count ? householderQr(scaled).r : scaled);
  const seen = Array.from(values, (value) => value > SMALLEST_SINGULAR_PART * (values[0] ?? 0));
  const direction = (k: number) => columnOf(v, k);
  /** J (scaled) times a vector. */
  const combine = (weights: ArrayLike<number>): Float64Array => {
    const row = new Float64Array(scaled.rows);
    for (let j = 0; j < count; j++) {
      const [weight, column] = [weights[j] ?? 0, columnOf(scaled, j)];
      for (let i = 0; i < row.length; i++) row[i] = (row[i] ?? 0) + weight * (column[i] ?? 0);
    }
    return row;
  };
  return {
    rowOf(gradient) {
      // A parameter that moves nothing at all has no scale: whatever leans on it is not determined.
      if (gradient.some((entry, j) => entry !== 0 && scales[j] === 0)) return null;
      const scaledGradient = gradient.map((entry, j) => entry * (scales[j] ?? 0));
      const length = Math.sqrt(dot(scaledGradient, scaledGradient));
      if (!Number.isFinite(length)) return null;
      const weights = new Float64Array(count);
      for (let k = 0; k < count; k++) {
        const share = dot(direction(k), scaledGradient);
        if (!seen[k]) {
          if (Math.abs(share) > LARGEST_UNSEEN_PART * length) return null;
          continue;
        }
        const factor = share / (values[k] ?? 1) ** 2;
        for (let j = 0; j < count; j++) weights[j] = (weights[j] ?? 0) + factor * (direction(k)[j] ?? 0);
      }
      return combine(weights);
    },
    basis: Array.from(values, (value, k) =>
      seen[k] ? combine(direction(k)).map((entry) => entry / value) : null,
    ).filter((column) => column !== null),
  };
}
