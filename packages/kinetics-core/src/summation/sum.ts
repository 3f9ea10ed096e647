/** Σ xᵢ in the order given; 0 for none. Rounding grows with the length: see `least-squares` for sums in twice the precision. */
export function sum(values: ArrayLike<number>): number {
  let total = 0;
  for (let i = 0; i < values.length; i++) total += values[i] ?? Number.NaN;
  return total;
}

/** Σ xᵢ²; 0 for none. */
export function sumOfSquares(values: ArrayLike<number>): number {
  let total = 0;
  for (let i = 0; i < values.length; i++) total += (values[i] ?? Number.NaN) ** 2;
  return total;
}
