import { sum } from "./sum";

/** Arithmetic mean. `values`: not empty; NaN where they are. */
export function mean(values: ArrayLike<number>): number {
  return sum(values) / values.length;
}

/** Σ (xᵢ − x̄)², in two passes, so that a large common offset costs no digits; 0 for one value and for none. */
export function squaresAboutMean(values: ArrayLike<number>): number {
  const centre = mean(values);
  let squares = 0;
  for (let i = 0; i < values.length; i++) squares += ((values[i] ?? Number.NaN) - centre) ** 2;
  return squares;
}
