import type { Tails } from "./incomplete-gamma";
import { logBetaKernel } from "./stirling-error";

/**
 * Regularised incomplete beta function: lower = I_x(a, b), upper = I_y(b, a) with y = 1 − x, a, b > 0, 0 ≤ x ≤ 1.
 * `y` may be passed where the caller knows it with more digits than 1 − x holds.
 * Continued fraction of Abramowitz and Stegun 26.5.8 by modified Lentz, on the side where it converges fast.
 */
export function incompleteBeta(a: number, b: number, x: number, y = 1 - x): Tails {
  if (!(a > 0) || !(b > 0) || !(x >= 0) || !(y >= 0))
    throw new RangeError(`incompleteBeta needs a, b > 0 and 0 <= x <= 1, got ${a}, ${b}, ${x}`);
  if (x === 0) return { lower: 0, upper: 1 };
  if (y === 0) return { lower: 1, upper: 0 };
  const kernel = Math.exp(logBetaKernel(a, b, x, y));
  if (x < (a + 1) / (a + b + 2)) {
    const lower = (kernel * continuedFraction(a, b, x)) / a;
    return { lower, upper: 1 - lower };
  }
  const upper = (kernel * continuedFraction(b, a, y)) / b;
  return { lower: 1 - upper, upper };
}

function continuedFraction(a: number, b: number, x: number): number {
  const tiny = 1e-300;
  let c = 1;
  let d = 1 - ((a + b) * x) / (a + 1);
  if (Math.abs(d) < tiny) d = tiny;
  d = 1 / d;
  let fraction = d;
  // Needs about √max(a, b) steps; the bound is far above any degrees of freedom met here.
  for (let m = 1; m < 100_000; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 + even * d;
    if (Math.abs(d) < tiny) d = tiny;
    c = 1 + even / c;
    if (Math.abs(c) < tiny) c = tiny;
    d = 1 / d;
    fraction *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 + odd * d;
    if (Math.abs(d) < tiny) d = tiny;
    c = 1 + odd / c;
    if (Math.abs(c) < tiny) c = tiny;
    d = 1 / d;
    const step = d * c;
    fraction *= step;
    if (Math.abs(step - 1) < 1e-16) break;
  }
  return fraction;
}
