import { incompleteBeta } from "kinetics-core/distributions";
import { mean as meanOf, medianOfSorted, sumOfSquares } from "kinetics-core/summation";

/** Summaries of a column; readings that are NaN count where it says so. */

/** Part of a column of zeros and ones; NaN counts as a zero: an interval that is not given covers nothing. */
export function share(column: Float64Array | undefined): number {
  return sum(column, (value) => (value === 1 ? 1 : 0)) / (column?.length ?? 0);
}

/** Of the finite values. */
export function mean(column: Float64Array | undefined): number {
  return meanOf(finiteOf(column));
}

/** Of the finite values. */
export function rootMeanSquare(column: Float64Array | undefined): number {
  const finite = finiteOf(column);
  return Math.sqrt(sumOfSquares(finite) / finite.length);
}

/** Of the finite values. */
export function median(values: ArrayLike<number>): number {
  return medianOfSorted(finiteOf(Float64Array.from(values)).sort());
}

export function countOnes(column: Float64Array | undefined): number {
  return sum(column, (value) => (value === 1 ? 1 : 0));
}

/** Least n with P(X ≤ n) ≥ p for X binomial(size, chance). */
export function binomialQuantile(p: number, size: number, chance: number): number {
  for (let n = 0; n < size; n++) if (incompleteBeta(size - n, n + 1, 1 - chance, chance).lower >= p) return n;
  return size;
}

function sum(column: Float64Array | undefined, of: (value: number) => number): number {
  return (column ?? new Float64Array()).reduce((total, value) => total + of(value), 0);
}

function finiteOf(column: Float64Array | undefined): Float64Array {
  return (column ?? new Float64Array()).filter(Number.isFinite);
}
