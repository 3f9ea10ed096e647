import { logPoissonDensity } from "./stirling-error";

/** Both tails of a distribution at one point; each keeps its own digits where the other is close to 1. */
export interface Tails {
  readonly lower: number;
  readonly upper: number;
}

/**
 * Regularised incomplete gamma functions P(a, x) (lower) and Q(a, x) (upper), a > 0, x ≥ 0.
 * Series below x = a + 1, continued fraction (modified Lentz) above: Abramowitz and Stegun 6.5.29 and 6.5.31.
 */
export function incompleteGamma(a: number, x: number): Tails {
  if (!(a > 0) || !(x >= 0))
    throw new RangeError(`incompleteGamma needs a > 0 and x >= 0, got ${a} and ${x}`);
  if (x === 0) return { lower: 0, upper: 1 };
  if (x === Number.POSITIVE_INFINITY) return { lower: 1, upper: 0 };
  const density = Math.exp(logPoissonDensity(a, x));
  if (x < a + 1) {
    let term = 1;
    let sum = 1;
    for (let n = 1; term > sum * 1e-17; n++) {
      term *= x / (a + n);
      sum += term;
    }
    const lower = density * sum;
    return { lower, upper: 1 - lower };
  }
  // Q(a, x) = x^a e^(−x)/Γ(a) · 1/(x + 1 − a − 1(1−a)/(x + 3 − a − …)); x^a e^(−x)/Γ(a) = a · density.
  const tiny = 1e-300;
  let b = x + 1 - a;
  let c = 1 / tiny;
  let d = 1 / b;
  let fraction = d;
  for (let i = 1; i < 100_000; i++) {
    const numerator = -i * (i - a);
    b += 2;
    d = numerator * d + b;
    if (Math.abs(d) < tiny) d = tiny;
    c = b + numerator / c;
    if (Math.abs(c) < tiny) c = tiny;
    d = 1 / d;
    const step = d * c;
    fraction *= step;
    if (Math.abs(step - 1) < 1e-16) break;
  }
  const upper = a * density * fraction;
  return { lower: 1 - upper, upper };
}
