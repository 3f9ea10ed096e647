/**
 * Σ aᵢ bᵢ as if it were summed in twice the working precision and rounded once (Ogita, Rump and Oishi, SIAM J. Sci.
 * Comput. 26 (2005) 1955-1988, algorithm 5.3): every product and every sum gives its rounding error as well, by the
 * transformations of Veltkamp, Dekker and Knuth. What is left of an inner product whose terms cancel is right to
 * nearly all digits; that is what the last steps of a fit, Jᵀr → 0, are made of.
 *
 * Terms above some 1e150 or below 1e-150 in size lose the gain, not the sum.
 */
export function compensatedDot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  let error = 0;
  for (let i = 0; i < a.length; i++) {
    const x = a[i] ?? 0;
    const y = b[i] ?? 0;
    const product = x * y;
    const before = sum;
    sum += product;
    const shift = sum - before;
    error += before - (sum - shift) + (product - shift) + productError(x, y, product);
  }
  const total = sum + error;
  return Number.isFinite(total) ? total : sum;
}

/** 2²⁷ + 1 halves a 53-bit significand. */
const SPLITTER = 134217729;

/** x·y − fl(x·y), exact short of over- and underflow. */
export function productError(x: number, y: number, product: number): number {
  const xScaled = SPLITTER * x;
  const xHigh = xScaled - (xScaled - x);
  const xLow = x - xHigh;
  const yScaled = SPLITTER * y;
  const yHigh = yScaled - (yScaled - y);
  const yLow = y - yHigh;
  return xLow * yLow - (product - xHigh * yHigh - xLow * yHigh - xHigh * yLow);
}
