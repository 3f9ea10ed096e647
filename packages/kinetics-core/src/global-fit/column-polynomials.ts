import { DENSE_COEFFICIENTS } from "./dormand-prince";

/** The columns of the Jacobian as polynomials of degree 4 in v on one piece of a course, written in place. */

/** dξ/dτ · factor from the coefficients of ξ: degree 3, the fifth coefficient is 0. */
export function slopePolynomial(extent: Float64Array, factor: number, into: Float64Array): void {
  into[0] = factor * (extent[1] ?? 0);
  into[1] = 2 * factor * (extent[2] ?? 0);
  into[2] = 3 * factor * (extent[3] ?? 0);
  into[3] = 4 * factor * (extent[4] ?? 0);
  into[4] = 0;
}

/** (middle + length·v) · slope, exact. */
export function timesTime(
  slope: Float64Array,
  middle: number,
  length: number,
  into: Float64Array,
  at: number,
): void {
  let lower = 0;
  for (let m = 0; m < DENSE_COEFFICIENTS; m++) {
    const here = slope[m] ?? 0;
    into[at + m] = middle * here + length * lower;
    lower = here;
  }
}

/** Second node beside the ends and the middle: the extremes of Chebyshev's polynomial of degree 4 on −½ … ½. */
const NODE = Math.SQRT1_2 / 2;

/**
 * slope · integral by the polynomial of degree 4 through five nodes. The product has degree 7; what is left out is of
 * the size of the step's own error and stands in the derivative only, where it delays the search and moves nothing.
 */
export function timesIntegral(
  slope: Float64Array,
  integral: Float64Array,
  from: number,
  into: Float64Array,
  at: number,
): void {
  const f0 = slope[0] ?? 0;
  const f1 = slope[1] ?? 0;
  const f2 = slope[2] ?? 0;
  const f3 = slope[3] ?? 0;
  const i0 = integral[from] ?? 0;
  const i1 = integral[from + 1] ?? 0;
  const i2 = integral[from + 2] ?? 0;
  const i3 = integral[from + 3] ?? 0;
  const i4 = integral[from + 4] ?? 0;
  // Even and odd parts at the ends (v² = 1/4) and at the inner nodes (v² = 1/8).
  const endEven = f0 + f2 / 4;
  const endOdd = 0.5 * (f1 + f3 / 4);
  const endIntegralEven = i0 + i2 / 4 + i4 / 16;
  const endIntegralOdd = 0.5 * (i1 + i3 / 4);
  const innerEven = f0 + f2 / 8;
  const innerOdd = NODE * (f1 + f3 / 8);
  const innerIntegralEven = i0 + i2 / 8 + i4 / 64;
  const innerIntegralOdd = NODE * (i1 + i3 / 8);
  const middle = f0 * i0;
  const inner = innerEven * innerIntegralEven + innerOdd * innerIntegralOdd;
  const end = endEven * endIntegralEven + endOdd * endIntegralOdd;
  const innerSlope = (innerEven * innerIntegralOdd + innerOdd * innerIntegralEven) / NODE;
  const endSlope = 2 * (endEven * endIntegralOdd + endOdd * endIntegralEven);
  into[at] = middle;
  into[at + 1] = 2 * innerSlope - endSlope;
  into[at + 2] = 16 * inner - 12 * middle - 4 * end;
  into[at + 3] = 8 * (endSlope - innerSlope);
  into[at + 4] = 32 * (end - 2 * inner + middle);
}

/** factor · polynomial. */
export function scaled(
  polynomial: Float64Array,
  from: number,
  factor: number,
  into: Float64Array,
  at: number,
): void {
  for (let m = 0; m < DENSE_COEFFICIENTS; m++) into[at + m] = factor * (polynomial[from + m] ?? 0);
}
