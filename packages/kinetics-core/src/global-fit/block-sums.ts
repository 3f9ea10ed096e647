import { BLOCK_POINTS } from "./constants";

/**
 * Sums, products and the lag-one product of columns that arrive in blocks: all that a least-squares step needs of a
 * trace. Two columns are taken against two others at a time, two rows in a turn, so that eight sums run side by side.
 */
export class BlockSums {
  /** The blocks, filled by the caller; column 0 is the residual. */
  readonly columns: readonly Float64Array[];
  readonly sums: Float64Array;
  /** products[a * width + b] for a ≤ b. */
  readonly products: Float64Array;
  /** Σ r_i r_{i+1}. */
  lagged = 0;
  first = 0;
  last = 0;
  count = 0;
  readonly width: number;
  private readonly padded: readonly Float64Array[];
  private readonly out = new Float64Array(6);

  constructor(width: number) {
    this.width = width;
    this.columns = Array.from({ length: width }, () => new Float64Array(BLOCK_POINTS));
    this.padded = width % 2 === 0 ? this.columns : [...this.columns, new Float64Array(BLOCK_POINTS)];
    this.sums = new Float64Array(width);
    this.products = new Float64Array(width * width);
  }

  clear(): void {
    this.sums.fill(0);
    this.products.fill(0);
    this.lagged = 0;
    this.count = 0;
  }

  /** Takes in the first `rows` of every column. */
  add(rows: number): void {
    const { width, padded, out, sums } = this;
    for (let a = 0; a < width; a += 2) {
      const a0 = padded[a];
      const a1 = padded[a + 1];
      if (a0 === undefined || a1 === undefined) continue;
      withItself(a0, a1, rows, out);
      this.into(a, a, 0);
      this.into(a, a + 1, 1);
      this.into(a + 1, a + 1, 2);
      sums[a] = (sums[a] ?? 0) + (out[3] ?? 0);
      if (a + 1 < width) sums[a + 1] = (sums[a + 1] ?? 0) + (out[4] ?? 0);
      for (let b = a + 2; b < width; b += 2) {
        const b0 = padded[b];
        const b1 = padded[b + 1];
        if (b0 === undefined || b1 === undefined) continue;
        twoByTwo(a0, a1, b0, b1, rows, out);
        this.into(a, b, 0);
        this.into(a, b + 1, 1);
        this.into(a + 1, b, 2);
        this.into(a + 1, b + 1, 3);
      }
    }
    this.lag(rows);
    this.count += rows;
  }

  private into(a: number, b: number, from: number): void {
    if (b >= this.width) return;
    const at = a * this.width + b;
    this.products[at] = (this.products[at] ?? 0) + (this.out[from] ?? 0);
  }

  private lag(rows: number): void {
    const r = this.columns[0];
    if (r === undefined || rows === 0) return;
    let even = 0;
    let odd = 0;
    let previous = r[0] ?? 0;
    if (this.count === 0) this.first = previous;
    else even = this.last * previous;
    let i = 1;
    for (; i + 1 < rows; i += 2) {
      const here = r[i] ?? 0;
      const next = r[i + 1] ?? 0;
      even += previous * here;
      odd += here * next;
      previous = next;
    }
    if (i < rows) {
      const here = r[i] ?? 0;
      even += previous * here;
      previous = here;
    }
    this.last = previous;
    this.lagged += even + odd;
  }
}

/** out: aa, ab, bb, Σa, Σb. */
function withItself(a: Float64Array, b: Float64Array, rows: number, out: Float64Array): void {
  let aa = 0;
  let ab = 0;
  let bb = 0;
  let sumA = 0;
  let sumB = 0;
  let aa2 = 0;
  let ab2 = 0;
  let bb2 = 0;
  let sumA2 = 0;
  let sumB2 = 0;
  let i = 0;
  for (; i + 1 < rows; i += 2) {
    const x = a[i] ?? 0;
    const y = b[i] ?? 0;
    const x2 = a[i + 1] ?? 0;
    const y2 = b[i + 1] ?? 0;
    aa += x * x;
    ab += x * y;
    bb += y * y;
    sumA += x;
    sumB += y;
    aa2 += x2 * x2;
    ab2 += x2 * y2;
    bb2 += y2 * y2;
    sumA2 += x2;
    sumB2 += y2;
  }
  if (i < rows) {
    const x = a[i] ?? 0;
    const y = b[i] ?? 0;
    aa += x * x;
    ab += x * y;
    bb += y * y;
    sumA += x;
    sumB += y;
  }
  out[0] = aa + aa2;
  out[1] = ab + ab2;
  out[2] = bb + bb2;
  out[3] = sumA + sumA2;
  out[4] = sumB + sumB2;
}

/** out: ac, ad, bc, bd. */
function twoByTwo(
  a: Float64Array,
  b: Float64Array,
  c: Float64Array,
  d: Float64Array,
  rows: number,
  out: Float64Array,
): void {
  let ac = 0;
  let ad = 0;
  let bc = 0;
  let bd = 0;
  let ac2 = 0;
  let ad2 = 0;
  let bc2 = 0;
  let bd2 = 0;
  let i = 0;
  for (; i + 1 < rows; i += 2) {
    const x = a[i] ?? 0;
    const y = b[i] ?? 0;
    const u = c[i] ?? 0;
    const v = d[i] ?? 0;
    const x2 = a[i + 1] ?? 0;
    const y2 = b[i + 1] ?? 0;
    const u2 = c[i + 1] ?? 0;
    const v2 = d[i + 1] ?? 0;
    ac += x * u;
    ad += x * v;
    bc += y * u;
    bd += y * v;
    ac2 += x2 * u2;
    ad2 += x2 * v2;
    bc2 += y2 * u2;
    bd2 += y2 * v2;
  }
  if (i < rows) {
    const x = a[i] ?? 0;
    const y = b[i] ?? 0;
    const u = c[i] ?? 0;
    const v = d[i] ?? 0;
    ac += x * u;
    ad += x * v;
    bc += y * u;
    bd += y * v;
  }
  out[0] = ac + ac2;
  out[1] = ad + ad2;
  out[2] = bc + bc2;
  out[3] = bd + bd2;
}
