/**
 * The parts of Γ that stay accurate for large arguments, so that densities never subtract two large logarithms.
 *
 * C. Loader, "Fast and accurate computation of binomial probabilities" (2000): with
 *   δ(n) = ln Γ(n+1) − (n + ½) ln n + n − ½ ln 2π   (error of Stirling's formula)
 *   D(x, m) = x ln(x/m) + m − x                      (half a deviance)
 * the Poisson density is e^(−δ(x) − D(x,m)) / √(2πx), and the binomial one follows from three of each.
 */

const HALF_LOG_TWO_PI = 0.9189385332046728;

/** δ(n), n > 0. Asymptotic series from 16 up, below it by the recursion δ(n) = δ(n+1) + (n + ½) ln(1 + 1/n) − 1. */
function stirlingError(n: number): number {
  let correction = 0;
  let argument = n;
  while (argument < 16) {
    correction += (argument + 0.5) * Math.log1p(1 / argument) - 1;
    argument += 1;
  }
  const inverse = 1 / argument;
  const square = inverse * inverse;
  // Bernoulli numbers B_2k / (2k (2k − 1)); the first dropped term is below 1e-19 at 16.
  const series =
    inverse *
    (1 / 12 -
      square *
        (1 / 360 -
          square *
            (1 / 1260 - square * (1 / 1680 - square * (1 / 1188 - square * (691 / 360360 - square / 156))))));
  return correction + series;
}

/** ln Γ(x), x > 0. */
export function logGamma(x: number): number {
  if (!(x > 0)) throw new RangeError(`logGamma needs an argument above 0, got ${x}`);
  // By way of Γ(x + 2), since Stirling's form loses digits against zero between 1 and 2.
  if (x < 2) return logGamma(x + 2) - Math.log(x) - Math.log1p(x);
  const n = x - 1;
  return stirlingError(n) + (n + 0.5) * Math.log(n) - n + HALF_LOG_TWO_PI;
}

/** D(x, m) = x ln(x/m) + m − x for x ≥ 0, m > 0, by series where x and m are close. */
function halfDeviance(x: number, m: number): number {
  if (x === 0) return m;
  const difference = x - m;
  if (Math.abs(difference) < 0.1 * (x + m)) {
    const v = difference / (x + m);
    let sum = difference * v;
    let term = 2 * x * v;
    for (let j = 1; j < 1000; j++) {
      term *= v * v;
      const next = sum + term / (2 * j + 1);
      if (next === sum) return next;
      sum = next;
    }
    return sum;
  }
  return x * Math.log(x / m) + m - x;
}

/** ln of x^a e^(−x) / Γ(a + 1), a > 0, x > 0: the Poisson density of a at mean x. */
export function logPoissonDensity(a: number, x: number): number {
  return -stirlingError(a) - halfDeviance(a, x) - 0.5 * Math.log(2 * Math.PI * a);
}

/** ln of x^a y^b Γ(a+b) / (Γ(a) Γ(b)) for x + y = 1, a, b > 0; y is given so that it keeps its digits near x = 1. */
export function logBetaKernel(a: number, b: number, x: number, y: number): number {
  const n = a + b;
  return (
    stirlingError(n) -
    stirlingError(a) -
    stirlingError(b) -
    halfDeviance(a, n * x) -
    halfDeviance(b, n * y) +
    0.5 * (Math.log(a) + Math.log(b) - Math.log(n) - Math.log(2 * Math.PI))
  );
}
