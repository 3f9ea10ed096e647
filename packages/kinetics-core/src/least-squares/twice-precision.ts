import { productError } from "./compensated-dot";

/** Numbers to about twice the working precision: each is the unevaluated sum of its two parts. */
export interface TwicePrecise {
  readonly values: Float64Array;
  /** What the rounding of `values` left out. */
  readonly remainders: Float64Array;
}

export function twicePrecise(values: ArrayLike<number>): TwicePrecise {
  return { values: Float64Array.from(values), remainders: new Float64Array(values.length) };
}

/** Adds a correction to element i. */
export function amend({ values, remainders }: TwicePrecise, i: number, correction: number): void {
  const before = values[i] ?? 0;
  const rest = (remainders[i] ?? 0) + correction;
  const sum = before + rest;
  values[i] = sum;
  remainders[i] = rest - (sum - before);
}

/** Each element times a factor of its own, with the error of the product kept. */
export function timesEach(numbers: TwicePrecise, factors: ArrayLike<number>): TwicePrecise {
  const product = twicePrecise(numbers.values);
  for (let i = 0; i < product.values.length; i++) {
    const value = numbers.values[i] ?? 0;
    const factor = factors[i] ?? 0;
    product.values[i] = value * factor;
    product.remainders[i] =
      productError(value, factor, value * factor) + (numbers.remainders[i] ?? 0) * factor;
  }
  return product;
}

/**
 * The columns 1, x, x², … of a polynomial design. The rounding of a high power alone costs as many digits of its
 * coefficient as the columns are alike, so it is kept.
 */
export function powersOf(x: ArrayLike<number>, degree: number): readonly TwicePrecise[] {
  const columns = [twicePrecise(Array.from(x, () => 1))];
  for (let k = 1; k <= degree; k++) columns.push(timesEach(columns[k - 1] ?? twicePrecise(x), x));
  return columns;
}
