/** The middle value, or the mean of the two in the middle. `values`: in any order, not empty; NaN where they are. */
export function median(values: ArrayLike<number>): number {
  return medianOfSorted(Float64Array.from(values).sort());
}

/** The same of values that rise already, without a copy. */
export function medianOfSorted(values: ArrayLike<number>): number {
  const middle = values.length >> 1;
  const upper = values[middle] ?? Number.NaN;
  return values.length % 2 === 1 ? upper : ((values[middle - 1] ?? Number.NaN) + upper) / 2;
}
