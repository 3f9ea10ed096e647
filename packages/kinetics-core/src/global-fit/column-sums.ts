import { DENSE_COEFFICIENTS } from "./dormand-prince";
import type { PieceMoments } from "./piece-moments";

/**
 * Sums and products of the columns [r, J] of one trace, piece by piece. Column 0 is the residual; the others are
 * polynomials on each piece, whose products are their coefficients on either side of the Hankel matrix of the moments.
 */
export class ColumnSums {
  readonly width: number;
  /** Coefficients of columns 1 … width − 1 on the present piece, five a column; those of column 0 are not used. */
  readonly polynomials: Float64Array;
  readonly sums: Float64Array;
  /** products[a · width + b] for a ≤ b. */
  readonly products: Float64Array;
  count = 0;
  /** Σ r_i r_{i+1}, and the residuals at both ends. */
  lagged = 0;
  first = 0;
  last = 0;

  constructor(width: number) {
    this.width = width;
    this.polynomials = new Float64Array(width * DENSE_COEFFICIENTS);
    this.sums = new Float64Array(width);
    this.products = new Float64Array(width * width);
  }

  clear(): void {
    this.sums.fill(0);
    this.products.fill(0);
    this.count = 0;
    this.lagged = 0;
  }

  add(moments: PieceMoments): void {
    const { width, polynomials, sums, products } = this;
    const { powers, residual } = moments;
    const s0 = powers[0] ?? 0;
    const s1 = powers[1] ?? 0;
    const s2 = powers[2] ?? 0;
    const s3 = powers[3] ?? 0;
    const s4 = powers[4] ?? 0;
    const s5 = powers[5] ?? 0;
    const s6 = powers[6] ?? 0;
    const s7 = powers[7] ?? 0;
    const s8 = powers[8] ?? 0;
    if (this.count === 0) this.first = moments.firstResidual;
    this.last = moments.lastResidual;
    this.lagged += moments.lagged;
    this.count += s0;
    sums[0] = (sums[0] ?? 0) + (residual[0] ?? 0);
    products[0] = (products[0] ?? 0) + moments.residualSquares;
    for (let a = 1; a < width; a++) {
      const at = a * DENSE_COEFFICIENTS;
      const p0 = polynomials[at] ?? 0;
      const p1 = polynomials[at + 1] ?? 0;
      const p2 = polynomials[at + 2] ?? 0;
      const p3 = polynomials[at + 3] ?? 0;
      const p4 = polynomials[at + 4] ?? 0;
      const h0 = s0 * p0 + s1 * p1 + s2 * p2 + s3 * p3 + s4 * p4;
      const h1 = s1 * p0 + s2 * p1 + s3 * p2 + s4 * p3 + s5 * p4;
      const h2 = s2 * p0 + s3 * p1 + s4 * p2 + s5 * p3 + s6 * p4;
      const h3 = s3 * p0 + s4 * p1 + s5 * p2 + s6 * p3 + s7 * p4;
      const h4 = s4 * p0 + s5 * p1 + s6 * p2 + s7 * p3 + s8 * p4;
      sums[a] = (sums[a] ?? 0) + h0;
      products[a] =
        (products[a] ?? 0) +
        p0 * (residual[0] ?? 0) +
        p1 * (residual[1] ?? 0) +
        p2 * (residual[2] ?? 0) +
        p3 * (residual[3] ?? 0) +
        p4 * (residual[4] ?? 0);
      for (let b = a; b < width; b++) {
        const to = b * DENSE_COEFFICIENTS;
        const place = a * width + b;
        products[place] =
          (products[place] ?? 0) +
          h0 * (polynomials[to] ?? 0) +
          h1 * (polynomials[to + 1] ?? 0) +
          h2 * (polynomials[to + 2] ?? 0) +
          h3 * (polynomials[to + 3] ?? 0) +
          h4 * (polynomials[to + 4] ?? 0);
      }
    }
  }

  /** Lag-one autocorrelation of the residuals about their mean. */
  lagOne(): number {
    const { count, lagged, first, last } = this;
    const total = this.sums[0] ?? 0;
    const mean = total / count;
    const variance = (this.products[0] ?? 0) - total * mean;
    if (!(variance > 0)) return 0;
    return (lagged - mean * (2 * total - first - last) + (count - 1) * mean * mean) / variance;
  }
}
